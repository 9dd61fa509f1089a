import type { CatalogueRow } from '../../store/catalogue-row.ts';

/** What stands where a value is missing. */
export const MISSING = '–';

/** A number with a fixed count of decimals and a true minus sign; an en dash when missing. */
export function fixed(value: number | null, decimals: number): string {
  if (value === null || !Number.isFinite(value)) return MISSING;
  return value.toFixed(decimals).replace('-', '−');
}

/** A value with its error, `0.12345 ± 0.00012`. */
export function withError(value: number | null, error: number | null, decimals: number): string {
  if (value === null) return MISSING;
  return error === null ? fixed(value, decimals) : `${fixed(value, decimals)} ± ${fixed(error, decimals)}`;
}

/** A probability in per cent; whole numbers, but never rounded to 0 or 100 % when it is neither. */
export function percent(share: number | null): string {
  if (share === null) return MISSING;
  const hundred = share * 100;
  if (hundred > 0 && hundred < 1) return '<1 %';
  if (hundred > 99 && hundred < 100) return '>99 %';
  return `${Math.round(hundred)} %`;
}

/** A count with thin spaces between thousands. */
export function whole(count: number): string {
  return String(Math.round(count)).replace(/\B(?=(\d{3})+$)/g, '\u{202F}');
}

/** `1 spectrum`, `2 spectra`. */
export function counted(count: number, one: string, many: string): string {
  return `${whole(count)} ${count === 1 ? one : many}`;
}

/** The answer of a row in a few words: stars by velocity, all others by redshift. */
export function answerInWords(row: CatalogueRow): string {
  if (row.redshift === null) return 'no redshift';
  if (row.kind === 'star' && row.velocity_km_s !== null) {
    return `star at ${withError(row.velocity_km_s, row.velocity_error_km_s, 1)} km/s`;
  }
  return `${row.kind ?? 'object'} at z = ${withError(row.redshift, row.redshift_error, 5)}`;
}
