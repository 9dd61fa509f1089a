import type { ArmLayout, ArraySource, Layout } from './layout.ts';

/** What a recogniser of one form found; `recogniseLayout` adds frame and targets. */
export interface Recognition {
  readonly form: Layout['form'];
  readonly arms: readonly ArmLayout[];
  readonly rowCount: number;
  readonly recognised: readonly string[];
  readonly missing: readonly string[];
}

/** An array in an image HDU. */
export function imageArray(hdu: number, imageRow: number | null = null): ArraySource {
  return { hdu, column: null, imageRow };
}

/** An array in a table column. */
export function columnArray(hdu: number, column: string): ArraySource {
  return { hdu, column, imageRow: null };
}
