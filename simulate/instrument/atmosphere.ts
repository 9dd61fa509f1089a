/**
 * Absorption bands of the air: vacuum limits (Å), depth at one airmass (from memory), and how their strength
 * grows with airmass (saturated oxygen with the square root, water nearly in proportion).
 */
const BANDS: readonly (readonly [from: number, to: number, depth: number, growth: number])[] = [
  [6278, 6320, 0.06, 0.5],
  [6868, 6950, 0.3, 0.5],
  [7165, 7340, 0.15, 0.9],
  [7593, 7705, 0.65, 0.5],
  [8128, 8346, 0.15, 0.9],
  [8942, 9222, 0.25, 0.9],
  [9293, 9800, 0.45, 0.9],
];

/**
 * What an imperfect correction for the bands leaves on a spectrum: transmission to the power of the error made.
 *
 * @param error relative error of the correction; positive = too little was corrected
 * @returns factor on the flux, 1 outside the bands
 */
export function bandResidual(wavelengthAngstrom: number, airmass: number, error: number): number {
  for (const [from, to, depth, growth] of BANDS) {
    if (wavelengthAngstrom < from || wavelengthAngstrom > to) continue;
    // Sharp at the blue edge, fading to the red, as the heads of the oxygen bands are.
    const part = (wavelengthAngstrom - from) / (to - from);
    const shape = part < 0.12 ? part / 0.12 : (1 - part) / 0.88;
    return (1 - depth * shape) ** (airmass ** growth * error);
  }
  return 1;
}
