import type { Frame } from './spectrum.ts';

/** Where one array of an arm comes from. */
export interface ArraySource {
  readonly hdu: number;
  /** Column name (binary table) or null (image). */
  readonly column: string | null;
  /** For few-row images that hold one spectrum: which row this array is; null otherwise. */
  readonly imageRow: number | null;
}

/** How the numbers of an array are meant. */
export type SpreadMeaning = 'error' | 'variance' | 'inverse-variance' | 'none';
export type WavelengthMeaning = 'linear' | 'log10' | 'ln';

export interface ArmLayout {
  readonly name: string;
  /** Null: the flux HDU's own spectral WCS. */
  readonly wavelength: ArraySource | null;
  readonly wavelengthMeaning: WavelengthMeaning;
  readonly wavelengthUnitAngstrom: number;
  readonly medium: 'vacuum' | 'air';
  readonly flux: ArraySource;
  readonly spread: ArraySource | null;
  readonly spreadMeaning: SpreadMeaning;
  /** Non-zero = unusable. */
  readonly quality: readonly ArraySource[];
  readonly sky: ArraySource | null;
  readonly lineSpread: ArraySource | null;
  readonly lineSpreadMeaning:
    | 'sigma-pixel'
    | 'sigma-angstrom'
    | 'sigma-km-s'
    | 'resolving-power'
    | 'resolution-matrix';
}

/**
 * How one file is read: a plain value (JSON-safe) that is stored at enqueue and handed to the workers,
 * so that planning and measuring can never disagree.
 */
export interface Layout {
  readonly form:
    | 'row-stack'
    | 'table-row-per-pixel'
    | 'table-row-per-spectrum'
    | 'image-one-spectrum'
    | 'text';
  readonly arms: readonly ArmLayout[];
  /** HDU of the table with one row per spectrum that names targets; null when there is none. */
  readonly targetsHdu: number | null;
  readonly rowCount: number;
  readonly frame: Frame;
  /** Sentences: what was recognised and from what. */
  readonly recognised: readonly string[];
  /** Sentences: what is missing or was assumed. */
  readonly missing: readonly string[];
}
