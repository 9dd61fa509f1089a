import type { Family } from '../../templates/family.ts';
import { fftOfSize } from '../core/fft.ts';
import type { SegmentTransform } from './data-transforms.ts';
import type { LagLayout } from './lag-layout.ts';

/** Which basis row (j = k absent) or product of rows sits in the real and imaginary part of a packed transform. */
export interface Packed {
  /** Entry numbers; `second` is −1 when the list is odd. */
  readonly first: number;
  readonly second: number;
  readonly chunks: SegmentTransform[];
}

/** Transforms of a family's rows and of their products, two reals in one complex, kept for one layout. */
export interface FamilyTransforms {
  readonly rows: readonly Packed[];
  readonly products: readonly Packed[];
  /** (j, k) of each product, j >= k. Products that vanish everywhere (separate emission lines) are left out. */
  readonly productOf: readonly (readonly [number, number])[];
}

interface Entry {
  readonly key: string;
  readonly transforms: FamilyTransforms;
}

/** Layouts kept per family: one per kind of spectrum in a night, and a little more. */
const KEPT_LAYOUTS = 3;
const cache = new WeakMap<Family, Entry[]>();

/** The transforms of a family for a layout; computed at first use and extended when a spectrum is longer. */
export function familyTransforms(family: Family, layout: LagLayout): FamilyTransforms {
  const entries = cache.get(family) ?? [];
  cache.set(family, entries);
  const key = `${layout.size} ${layout.segment} ${layout.firstLag}`;
  let entry = entries.find((known) => known.key === key);
  if (entry === undefined) {
    entry = { key, transforms: emptyTransforms(family) };
    entries.unshift(entry);
    entries.length = Math.min(entries.length, KEPT_LAYOUTS);
  }
  extend(entry.transforms, family, layout);
  return entry.transforms;
}

function emptyTransforms(family: Family): FamilyTransforms {
  const productOf: [number, number][] = [];
  family.basis.forEach((row, j) => {
    for (let k = 0; k <= j; k++) {
      const other = family.basis[k]!;
      if (row.some((value, i) => value * other[i]! !== 0)) productOf.push([j, k]);
    }
  });
  return { rows: packedPairs(family.basis.length), products: packedPairs(productOf.length), productOf };
}

function packedPairs(entries: number): Packed[] {
  return Array.from({ length: Math.ceil(entries / 2) }, (_, i) => ({
    first: 2 * i,
    second: 2 * i + 1 < entries ? 2 * i + 1 : -1,
    chunks: [],
  }));
}

function extend(transforms: FamilyTransforms, family: Family, layout: LagLayout): void {
  const row =
    (entry: number) =>
    (i: number): number =>
      family.basis[entry]![i]!;
  const product = (entry: number) => {
    const [j, k] = transforms.productOf[entry]!;
    const a = family.basis[j]!;
    const b = family.basis[k]!;
    return (i: number): number => a[i]! * b[i]!;
  };
  for (const [list, valueOf] of [
    [transforms.rows, row],
    [transforms.products, product],
  ] as const) {
    for (const packed of list) {
      for (let s = packed.chunks.length; s < layout.segments; s++) {
        packed.chunks.push(
          transformChunk(
            valueOf(packed.first),
            packed.second < 0 ? null : valueOf(packed.second),
            layout.firstLag + s * layout.segment,
            family.grid.length,
            layout.size,
          ),
        );
      }
    }
  }
}

/** Transform of size samples from `start` on, zero outside 0 .. length − 1; `b` goes to the imaginary part. */
function transformChunk(
  a: (i: number) => number,
  b: ((i: number) => number) | null,
  start: number,
  length: number,
  size: number,
): SegmentTransform {
  const re = new Float64Array(size);
  const im = new Float64Array(size);
  for (let i = Math.max(0, start); i < Math.min(start + size, length); i++) {
    re[i - start] = a(i);
    if (b !== null) im[i - start] = b(i);
  }
  fftOfSize(size).forward(re, im);
  return { re, im };
}
