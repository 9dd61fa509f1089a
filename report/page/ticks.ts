/** Positions of axis marks at 1, 2 or 5 times a power of ten, about `wanted` of them, inside [from, to]. */
export function ticks(from: number, to: number, wanted: number): readonly number[] {
  if (!(to > from)) return [from];
  const rough = (to - from) / wanted;
  const power = Math.pow(10, Math.floor(Math.log10(rough)));
  const step = [1, 2, 5, 10].map((factor) => factor * power).find((candidate) => candidate >= rough)!;
  const first = Math.ceil(from / step - 1e-9);
  const last = Math.floor(to / step + 1e-9);
  return Array.from({ length: last - first + 1 }, (_, i) => Number(((first + i) * step).toPrecision(12)));
}
