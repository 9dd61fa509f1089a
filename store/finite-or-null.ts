/**
 * The border of the store for numbers: SQLite would keep NaN as NULL and PostgreSQL as NaN, so neither may
 * see one.
 *
 * @returns the number itself, or null when it is missing, NaN or infinite
 */
export function finiteOrNull(value: number | null | undefined): number | null {
  return value !== null && value !== undefined && Number.isFinite(value) ? value : null;
}

/** JSON text of a value with every not-finite number inside it turned into null. */
export function storedJson(value: unknown): string {
  return JSON.stringify(value, (_key, inner: unknown) =>
    typeof inner === 'number' && !Number.isFinite(inner) ? null : inner,
  );
}
