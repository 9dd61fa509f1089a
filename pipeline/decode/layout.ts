import type { Frame, Site } from './spectrum.ts';

/** Where one array of an arm comes from. */
export interface ArraySource {
  readonly hdu: number;
  /** Column name (binary table, text) or null (image). */
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
  /** Masks. Where there are several, the narrowest that the others contain is the one that counts. */
  readonly quality: readonly ArraySource[];
  /** Which value of a mask marks a pixel as unusable; `nonzero` when absent. */
  readonly qualityBadWhen?: 'nonzero' | 'zero';
  /** What turns flux into flux per ångström; `none` when absent. */
  readonly fluxPer?: 'none' | 'hertz' | 'jansky';
  readonly sky: ArraySource | null;
  readonly lineSpread: ArraySource | null;
  readonly lineSpreadMeaning:
    | 'sigma-pixel'
    | 'fwhm-pixel'
    | 'fwhm-angstrom'
    | 'sigma-angstrom'
    | 'sigma-km-s'
    | 'resolving-power'
    | 'resolution-matrix';
}

/** Names of the columns that say what each spectrum is; null = the table has no such column. */
export interface TargetColumns {
  readonly name: string | null;
  readonly ra: string | null;
  readonly dec: string | null;
  readonly fibre: string | null;
  readonly role: string | null;
  readonly targetClass: string | null;
  readonly magnitude: string | null;
  readonly magnitudeBand: string | null;
}

/** A table with a row per exposure of each spectrum, told by the column it shares with the targets. */
export interface ExposureTable {
  readonly hdu: number;
  readonly targetColumn: string;
  /** Modified Julian Date of each exposure, days. */
  readonly mjdColumn: string;
  /** Seconds; null when the table does not give it. */
  readonly durationColumn: string | null;
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
  /** Columns of `targetsHdu`; absent when there is none. */
  readonly targetColumns?: TargetColumns;
  /** Absent when the file does not list the exposures that went into its spectra. */
  readonly exposures?: ExposureTable;
  /** From a profile; overrides what headers say. */
  readonly site?: Site;
  /** Constant λ/Δλ(FWHM) from a profile, used where an arm has no line spread of its own. */
  readonly resolvingPower?: number;
  readonly rowCount: number;
  readonly frame: Frame;
  /** Sentences: what was recognised and from what. */
  readonly recognised: readonly string[];
  /** Sentences: what is missing or was assumed. */
  readonly missing: readonly string[];
}
