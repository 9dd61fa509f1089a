import type { RedshiftWindow } from './windows.ts';

/** What is stored about quasars; the rest is drawn when the families are prepared. */
export interface QuasarSet {
  /** The iron blend, on the search grid. */
  readonly iron: Float32Array;
  /** Search vectors of every redshift window, on the search grid. */
  readonly windows: readonly { readonly window: RedshiftWindow; readonly vectors: readonly Float32Array[] }[];
}
