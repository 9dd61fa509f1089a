/**
 * Legendre polynomials P_0 .. P_order at n equally spaced places from −1 to 1 (a single place is 0), by the
 * recurrence (p+1) P_{p+1} = (2p+1) x P_p − p P_{p−1} (Abramowitz & Stegun 1964, 8.5.3).
 *
 * @param n number of places, >= 0
 * @param order highest order; −1 gives no rows
 * @returns order + 1 rows of length n
 */
export function legendreRows(n: number, order: number): Float64Array[] {
  const x = Float64Array.from({ length: n }, (_, i) => (n > 1 ? (2 * i) / (n - 1) - 1 : 0));
  const rows: Float64Array[] = [];
  for (let p = 0; p <= order; p++) {
    const row = new Float64Array(n);
    if (p === 0) row.fill(1);
    else if (p === 1) row.set(x);
    else {
      const last = rows[p - 1]!;
      const before = rows[p - 2]!;
      for (let i = 0; i < n; i++) row[i] = ((2 * p - 1) * x[i]! * last[i]! - (p - 1) * before[i]!) / p;
    }
    rows.push(row);
  }
  return rows;
}
