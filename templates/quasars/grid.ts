import type { LogGrid } from '../family.ts';
import { COMPONENT_STEP, componentGridOver, pairedGrid } from '../prepare/log-grid.ts';

/** Where stored spectra of stars and populations begin, vacuum ångström: the quasar grid is laid through it. */
const HOST_START = 1460;
/** Lyman α at redshift 7 lies at 9725 Å, so 700 Å there is below any optical spectrum. */
const SHORTEST = 700;
/** Optical spectra at redshift 0 end near here. */
const LONGEST = 10_600;

/** Pixels between the start of the quasar grid and that of the host spectra; even, so that pairs line up too. */
export const HOST_OFFSET = 2 * Math.ceil(Math.log(HOST_START / SHORTEST) / COMPONENT_STEP / 2);

/** Refit grid of quasars: 700–10,600 Å in steps of 34.5 km/s. */
export const QUASAR_GRID: LogGrid = componentGridOver(
  HOST_START * Math.exp(-HOST_OFFSET * COMPONENT_STEP),
  LONGEST,
);

/** Search grid of quasars, twice the step. */
export const QUASAR_SEARCH_GRID: LogGrid = pairedGrid(QUASAR_GRID);
