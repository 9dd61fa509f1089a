import type { ArmLayout } from './layout.ts';

/** Where the factor from flux per frequency to flux per ångström is 1. */
const REFERENCE_ANGSTROM = 5_000;

/**
 * Whether a flux unit is per hertz, and so must be turned into per ångström.
 *
 * @param unit as written, e.g. `erg/s/cm2/Hz`, `Jy`, `1e-17 erg s-1 cm-2 Angstrom-1`
 */
export function fluxPerOf(unit: string): NonNullable<ArmLayout['fluxPer']> {
  if (/\b[mun µ]?Jy\b|jansky/i.test(unit)) return 'jansky';
  return /Hz|hertz/.test(unit) ? 'hertz' : 'none';
}

/**
 * Turn flux per unit frequency into flux per ångström, in place: F_λ = F_ν c/λ². Only the shape matters to a redshift,
 * so c and powers of ten are left out and the factor is 1 at 5,000 Å.
 *
 * @param values flux, or with `of` = 'inverse-variance' its inverse variance
 * @param wavelengthAngstrom same length
 */
export function perAngstrom(
  values: Float64Array,
  wavelengthAngstrom: Float64Array,
  of: 'flux' | 'inverse-variance',
): void {
  const power = of === 'flux' ? 2 : -4;
  for (let i = 0; i < values.length; i += 1) {
    values[i] = values[i]! * (REFERENCE_ANGSTROM / wavelengthAngstrom[i]!) ** power;
  }
}
