import type { StarGrid, StarModel } from '../prepare/star-grid.ts';
import type { StarGroup } from '../stars/parameters.ts';

/** Stars below this gravity and temperature are taken from the giants of the grid, others from the dwarfs. */
const GIANT_GRAVITY = 3.9;
const HOTTEST_GIANT = 6100;
/** Keeps the logarithm of a flux finite where a cool star has none. */
const SMALLEST_FLUX = 1e-30;

/** Surface flux density (erg s⁻¹ cm⁻² Å⁻¹) of a star of any temperature and metallicity. */
export type StarAt = (temperature: number, logGravity: number, metallicity: number) => Float64Array;

/**
 * Interpolates in a grid of stars: logarithm of flux linear in log temperature, flux linear in metallicity.
 * Beyond the coolest or hottest model the nearest one is scaled by T⁴; a metallicity without hot models
 * borrows the solar one.
 *
 * @throws RangeError when the grid has no dwarf or no giant
 */
export function starsBetween(stars: StarGrid): StarAt {
  const dwarfs = byMetallicity(stars.models, 'dwarf');
  const giants = byMetallicity(stars.models, 'giant');
  return (temperature, logGravity, metallicity) => {
    const table = logGravity < GIANT_GRAVITY && temperature < HOTTEST_GIANT ? giants : dwarfs;
    const values = [...table.keys()].sort((a, b) => a - b);
    const at = (value: number): Float64Array => atTemperature(table, value, temperature);
    if (metallicity <= values[0]!) return at(values[0]!);
    if (metallicity >= values.at(-1)!) return at(values.at(-1)!);
    const upper = values.findIndex((value) => value >= metallicity);
    if (values[upper] === metallicity) return at(metallicity);
    const part = (metallicity - values[upper - 1]!) / (values[upper]! - values[upper - 1]!);
    const low = at(values[upper - 1]!);
    const high = at(values[upper]!);
    return low.map((flux, i) => (1 - part) * flux + part * high[i]!);
  };
}

type Sequences = ReadonlyMap<number, readonly StarModel[]>;

/** Models of a group by metallicity, each list ascending in temperature. */
function byMetallicity(models: readonly StarModel[], group: StarGroup): Sequences {
  const table = new Map<number, StarModel[]>();
  for (const model of models) {
    if (model.group !== group) continue;
    const list = table.get(model.metallicity) ?? [];
    list.push(model);
    table.set(model.metallicity, list);
  }
  if (table.size === 0) throw new RangeError(`the star grid must hold at least one ${group}, got none`);
  for (const list of table.values()) list.sort((a, b) => a.temperature - b.temperature);
  return table;
}

function atTemperature(table: Sequences, metallicity: number, temperature: number): Float64Array {
  const list = table.get(metallicity)!;
  const coolest = list[0]!;
  const hottest = list.at(-1)!;
  if (temperature <= coolest.temperature) return scaled(coolest, temperature);
  if (temperature >= hottest.temperature) {
    return metallicity !== 0 && table.has(0)
      ? atTemperature(table, 0, temperature)
      : scaled(hottest, temperature);
  }
  const upper = list.findIndex((model) => model.temperature > temperature);
  const cool = list[upper - 1]!;
  const hot = list[upper]!;
  const part = Math.log(temperature / cool.temperature) / Math.log(hot.temperature / cool.temperature);
  return Float64Array.from(cool.flux, (flux, i) => {
    const logCool = Math.log(flux * cool.scale + SMALLEST_FLUX);
    const logHot = Math.log(hot.flux[i]! * hot.scale + SMALLEST_FLUX);
    return Math.exp((1 - part) * logCool + part * logHot);
  });
}

/** A model as if it radiated like a black body of another temperature in total. */
function scaled(model: StarModel, temperature: number): Float64Array {
  const factor = model.scale * (temperature / model.temperature) ** 4;
  return Float64Array.from(model.flux, (flux) => flux * factor);
}
