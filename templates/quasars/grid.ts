import type { LogGrid } from '../family.ts';
import { gridThrough, pairedGrid } from '../prepare/log-grid.ts';
import { STORED_GRID } from '../stars/stored-grid.ts';

/** Lyman α at redshift 7 lies at 9725 Å, so 700 Å there is below any optical spectrum. */
const SHORTEST = 700;
/** Optical spectra at redshift 0 end near here. */
const LONGEST = 10_600;

/** Refit grid of quasars: 700–10,600 Å in steps of 34.5 km/s, laid through the pixels of stored populations. */
export const QUASAR_GRID: LogGrid = gridThrough(STORED_GRID, SHORTEST, LONGEST);

/** Search grid of quasars, twice the step. */
export const QUASAR_SEARCH_GRID: LogGrid = pairedGrid(QUASAR_GRID);
