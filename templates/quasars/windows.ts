import type { LogGrid } from '../family.ts';
import { intergalacticTransmission, QUASAR_PROXIMITY_KM_S } from '../intergalactic/madau.ts';
import { wavelengthsOf } from '../prepare/log-grid.ts';
import { principalVectors } from '../prepare/principal-vectors.ts';
import { drawQuasars } from './draws.ts';

/** A range of redshift searched with one set of vectors. */
export interface RedshiftWindow {
  readonly from: number;
  readonly to: number;
}

/** Windows short enough that the same lines are in view and the forest is about as deep throughout. */
export const WINDOWS: readonly RedshiftWindow[] = [
  { from: 0.02, to: 1.9 },
  { from: 1.9, to: 2.3 },
  { from: 2.3, to: 2.7 },
  { from: 2.7, to: 3.2 },
  { from: 3.2, to: 3.8 },
  { from: 3.8, to: 4.6 },
  { from: 4.6, to: 5.6 },
  { from: 5.6, to: 7 },
];

/** Search vectors per window: two or seven find the same quasars as four (ablation of the prototype). */
export const VECTORS_PER_WINDOW = 4;
/** Quasars drawn per window, and the seed of the draw. */
export const DRAWS = 250;
export const DRAW_SEED = 3;
/** What optical spectrographs see, ångström: only the rest wavelengths that fall in here shape the vectors. */
const OBSERVED: readonly [number, number] = [3500, 10_500];
/** Pixels never in view keep this weight so that the vectors stay defined there. */
const OUT_OF_VIEW = 1e-6;

/**
 * The search vectors of every window: principal vectors of drawn quasars, each seen through the mean
 * intergalactic hydrogen of a redshift of its own, spread evenly over the window.
 *
 * @returns per window {@link VECTORS_PER_WINDOW} unit-rms rows
 */
export function windowVectors(grid: LogGrid, iron: Float32Array): Float32Array[][] {
  const draws = drawQuasars(grid, iron, DRAWS, DRAW_SEED);
  const wavelengths = wavelengthsOf(grid);
  return WINDOWS.map(({ from, to }) => {
    const weight = Float64Array.from(wavelengths, (wavelength) =>
      wavelength * (1 + to) > OBSERVED[0] && wavelength * (1 + from) < OBSERVED[1] ? 1 : OUT_OF_VIEW,
    );
    const rows = draws.map((flux, k) => {
      const redshift = from + ((to - from) * (k + 0.5)) / draws.length;
      const seen = flux.map(
        (value, i) => value * intergalacticTransmission(wavelengths[i]!, redshift, QUASAR_PROXIMITY_KM_S),
      );
      const level = medianInView(seen, weight);
      return seen.map((value) => value / level);
    });
    return principalVectors(rows, VECTORS_PER_WINDOW, weight);
  });
}

function medianInView(flux: Float32Array, weight: Float64Array): number {
  const inView = flux.filter((_, i) => weight[i] === 1).sort();
  return inView[inView.length >> 1]!;
}
