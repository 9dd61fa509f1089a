import { ATMOSPHERE_BANDS, type AtmosphereBand } from './atmosphere-bands.ts';
import { NIGHT_SKY_CORES, type SkyLineCore } from './sky-lines.ts';

/** What a caller may change about the grid stage. */
export interface GridOptions {
  /** Pixel of the common axis in ln(wavelength). */
  readonly step: number;
  /** Only pixels centred in this range of observed vacuum ångström are used. */
  readonly wavelengthMinAngstrom: number;
  readonly wavelengthMaxAngstrom: number;
  /** Usable pixels dropped at each end of each arm: calibration and extraction are worst there. */
  readonly edgePixels: number;
  readonly skyLines: readonly SkyLineCore[];
  readonly atmosphereBands: readonly AtmosphereBand[];
  /** Look for isolated spikes (cosmic rays, dead pixels). */
  readonly rejectSpikes: boolean;
}

/** 69 km/s, the usual pixel of surveys at resolving power 2,000; the families are built on it. */
export const DEFAULT_STEP = Math.LN10 * 1e-4;

export const DEFAULT_GRID_OPTIONS: GridOptions = {
  step: DEFAULT_STEP,
  // Spectrographs of ground-based surveys deliver little but noise outside this range.
  wavelengthMinAngstrom: 3600,
  wavelengthMaxAngstrom: 9800,
  edgePixels: 4,
  skyLines: NIGHT_SKY_CORES,
  atmosphereBands: ATMOSPHERE_BANDS,
  rejectSpikes: true,
};
