import type { WavelengthMeaning } from '../layout.ts';

/** What a unit text says about an axis: ångström per unit, and whether the numbers are logarithms. */
export interface WavelengthUnit {
  readonly angstrom: number;
  readonly meaning: WavelengthMeaning;
}

const ANGSTROM_PER_UNIT: readonly (readonly [RegExp, number])[] = [
  [/^(a|aa|ang|angs|angstroms?|angstroem|ångstr[oö]ms?|å|0\.1 ?nm)$/, 1],
  [/^(nm|nanomet(er|re)s?)$/, 10],
  [/^(um|µm|μm|micron?s?|micromet(er|re)s?)$/, 1e4],
  [/^(mm|millimet(er|re)s?)$/, 1e7],
  [/^(cm|centimet(er|re)s?)$/, 1e8],
  [/^(m|met(er|re)s?)$/, 1e10],
];

/** `log`, `log10(...)`, `ln [..]`, `dex(...)` around or before a unit. */
const LOGARITHM = /^(log_?10|log|lg|dex|ln|loge)\s*[([{ ]?\s*(.*?)\s*[)\]}]?$/;

/**
 * Read the unit of a wavelength axis.
 *
 * @param text as found in a file or profile: `Angstrom`, `nm`, `um`, `log10 Angstrom`, `ln(Angstrom)`, …
 * @returns null when the text is empty or is no unit of length
 */
export function parseWavelengthUnit(text: string): WavelengthUnit | null {
  const plain = text.trim().toLowerCase();
  if (plain === '') return null;
  const factor = lengthFactor(plain);
  if (factor !== null) return { angstrom: factor, meaning: 'linear' };
  const logarithm = LOGARITHM.exec(plain);
  if (logarithm === null) return null;
  const inner = logarithm[2] === '' || logarithm[2] === undefined ? 1 : lengthFactor(logarithm[2]);
  if (inner === null) return null;
  return { angstrom: inner, meaning: /^(ln|loge)/.test(plain) ? 'ln' : 'log10' };
}

function lengthFactor(plain: string): number | null {
  for (const [pattern, factor] of ANGSTROM_PER_UNIT) if (pattern.test(plain)) return factor;
  return null;
}
