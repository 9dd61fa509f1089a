import type { Family } from '../family.ts';
import type { PopulationSet } from '../galaxies/population-set.ts';
import { broaden } from '../prepare/broaden.ts';
import { stepKmS } from '../prepare/log-grid.ts';
import { toUnitRms } from '../prepare/unit-rows.ts';
import { QUASAR_GRID, QUASAR_SEARCH_GRID } from './grid.ts';
import { quasarComponents } from './quasar-components.ts';
import type { QuasarSet } from './quasar-set.ts';

/** Relative mismatch of the best model: lines are skewed, iron is a guess (prototype on bright quasars). */
const MISMATCH = 0.04;

/**
 * One family per redshift window, `quasar-0.0` to `quasar-5.6`, all refitted with the same components.
 *
 * @param lineSpreadKmS Gaussian sigma of the instrument
 */
export function quasarFamilies(set: QuasarSet, hosts: PopulationSet, lineSpreadKmS: number): Family[] {
  const componentsAt = quasarComponents(doubled(set.iron, QUASAR_GRID.length), hosts, lineSpreadKmS);
  const sigma = lineSpreadKmS / stepKmS(QUASAR_SEARCH_GRID);
  return set.windows.map(({ window, vectors }) => ({
    name: `quasar-${window.from.toFixed(1)}`,
    kind: 'quasar',
    grid: QUASAR_SEARCH_GRID,
    componentGrid: QUASAR_GRID,
    basis: vectors.map((vector) => toUnitRms(broaden(vector, sigma))),
    redshiftMin: window.from,
    redshiftMax: window.to,
    refitSet: 'quasar',
    componentsAt,
    multiplicativeOrder: 1,
    additiveOrder: -1,
    mismatch: MISMATCH,
  }));
}

/** A smooth spectrum on the search grid, brought to the refit grid by linear interpolation. */
function doubled(flux: Float32Array, length: number): Float32Array {
  const last = flux.length - 1;
  return Float32Array.from({ length }, (_, i) => {
    // Refit pixel i lies at i/2 − 1/4 search pixels, clamped to the ends.
    const at = Math.min(last, Math.max(0, 0.5 * i - 0.25));
    const low = Math.min(last - 1, Math.floor(at));
    return flux[low]! + (at - low) * (flux[low + 1]! - flux[low]!);
  });
}
