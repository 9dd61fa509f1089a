/**
 * Order of UTF-16 code units, which no locale and no database collation changes.
 *
 * @returns a comparison for Array.sort over the text that `key` takes from an element
 */
export function byCodeUnit<T>(key: (element: T) => string): (a: T, b: T) => number {
  return (a, b) => {
    const left = key(a);
    const right = key(b);
    return left < right ? -1 : left > right ? 1 : 0;
  };
}
