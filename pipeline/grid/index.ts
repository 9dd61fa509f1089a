export { ATMOSPHERE_BANDS, type AtmosphereBand } from './atmosphere-bands.ts';
export { type ExposureContext, NO_EXPOSURE_CONTEXT } from './exposure-context.ts';
export { exposureContext } from './exposure-noise.ts';
export type { Grid, GridArm, NativePixels } from './grid.ts';
export { DEFAULT_GRID_OPTIONS, DEFAULT_STEP, type GridOptions } from './grid-options.ts';
export { NIGHT_SKY_CORES, observatoryToAxis, type SkyLineCore } from './sky-lines.ts';
export { toGrid } from './to-grid.ts';
