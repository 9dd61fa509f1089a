/**
 * Share of hydrogen atoms in level `level` that still exist as bound atoms among the fields of `electrons`
 * (cm^-3) charges: 1 for deep levels, 0 for dissolved ones. A smooth step at the last visible line of
 * Inglis & Teller 1939 (ApJ 90, 439: log n_e = 23.26 - 7.5 log n), with the (n/n_IT)^7.5 argument that the
 * Hummer & Mihalas 1988 (ApJ 331, 794) occupation probability has for charged perturbers.
 * The depth of the step (0.416) is a choice, not published.
 */
export function boundShare(level: number, electrons: number): number {
  const lastLevel = 10 ** ((INGLIS_TELLER - Math.log10(Math.max(electrons, LEAST_ELECTRONS))) / 7.5);
  return Math.exp(-STEP_DEPTH * (level / lastLevel) ** 7.5);
}

const INGLIS_TELLER = 23.26;
const STEP_DEPTH = 0.416;
/** Keeps the logarithm finite. */
const LEAST_ELECTRONS = 1e-30;
