import { meanOver } from '../prepare/log-grid.ts';
import type { StarGrid } from '../prepare/star-grid.ts';
import { GIANTS, type GiantStage } from './giants.ts';
import { initialMassFunction } from './initial-mass.ts';
import { agedStar, LEAST_MASS } from './main-sequence.ts';
import { type StarAt, starsBetween } from './star-between.ts';

/** How one population of stars of one age and metallicity is made. */
export interface PopulationRecipe {
  /** Age (`g` = 10⁹ years, `m` = 10⁶ years) and [M/H]. */
  readonly name: string;
  /** Age in 10⁹ years. */
  readonly age: number;
  /** Mass of the stars about to leave the main sequence, solar masses. */
  readonly turnOff: number;
  readonly metallicity: number;
  readonly giants: readonly GiantStage[];
  /** Relative shift of main-sequence temperatures with metallicity; giants shift half as much. */
  readonly temperatureShift: number;
  /** Share of the giants in the light at 5500 Å. */
  readonly giantShare: number;
}

const recipe = (
  name: string,
  age: number,
  turnOff: number,
  metallicity: number,
  giants: readonly GiantStage[],
  temperatureShift: number,
  giantShare: number,
): PopulationRecipe => ({ name, age, turnOff, metallicity, giants, temperatureShift, giantShare });

/** Turn-off masses, shifts and giant shares chosen by hand to follow published isochrones (from memory). */
export const POPULATIONS: readonly PopulationRecipe[] = [
  recipe('10g-rich', 10, 0.98, 0.3, GIANTS.old, -0.02, 0.55),
  recipe('10g-solar', 10, 0.98, 0, GIANTS.old, 0, 0.55),
  recipe('10g-half', 10, 0.95, -0.5, GIANTS.old, 0.03, 0.52),
  recipe('12g-tenth', 12, 0.88, -1, GIANTS.metalPoor, 0.06, 0.5),
  recipe('12g-hundredth', 12, 0.84, -2, GIANTS.metalPoor, 0.1, 0.5),
  recipe('5g-solar', 5, 1.18, 0, GIANTS.intermediate, 0, 0.5),
  recipe('3g-solar', 3, 1.42, 0, GIANTS.intermediate, 0, 0.45),
  recipe('3g-half', 3, 1.38, -0.5, GIANTS.intermediate, 0.03, 0.45),
  recipe('1500m-solar', 1.5, 1.8, 0, GIANTS.clump, 0, 0.4),
  recipe('1g-solar', 1, 2.1, 0, GIANTS.clump, 0, 0.35),
  recipe('600m-solar', 0.6, 2.6, 0, GIANTS.clump, 0, 0.25),
  recipe('300m-solar', 0.3, 3.3, 0, GIANTS.young, 0, 0.2),
  recipe('100m-solar', 0.1, 5.2, 0, GIANTS.young, 0, 0.15),
  recipe('30m-solar', 0.03, 9, 0, GIANTS.young, 0, 0.1),
  recipe('5m-solar', 0.005, 30, 0, GIANTS.young, 0, 0.01),
];

/** Masses the main sequence is summed over. */
const MASS_STEPS = 40;
/** Gravity of dwarfs, by temperature. */
const HOT_DWARF = 7000;
/** Band in which giants and dwarfs are weighed against each other, ångström. */
const BAND: readonly [number, number] = [5400, 5600];

/**
 * The light of each population: main-sequence stars weighted by initial mass function and radius, plus giants
 * by their share of the light at 5500 Å. Sharp: no velocity dispersion yet.
 *
 * @returns flux density per ångström with mean 1 in 5400–5600 Å, on the grid of the stars
 */
export function populationSpectra(
  stars: StarGrid,
  recipes: readonly PopulationRecipe[] = POPULATIONS,
): Float32Array[] {
  const starAt = starsBetween(stars);
  const unitBand = (flux: Float64Array): Float64Array => {
    const mean = meanOver(stars.grid, flux, BAND[0], BAND[1]);
    return flux.map((value) => value / mean);
  };
  return recipes.map((each) => {
    const dwarfs = unitBand(mainSequenceLight(starAt, stars.grid.length, each));
    const giants = unitBand(giantLight(starAt, stars.grid.length, each, unitBand));
    return Float32Array.from(
      dwarfs,
      (flux, i) => (1 - each.giantShare) * flux + each.giantShare * giants[i]!,
    );
  });
}

/** ∫ IMF(m) R² F dm over masses spaced geometrically from the least mass to the turn-off. */
function mainSequenceLight(starAt: StarAt, length: number, each: PopulationRecipe): Float64Array {
  const light = new Float64Array(length);
  const ratio = each.turnOff / LEAST_MASS;
  const massAt = (k: number): number => LEAST_MASS * ratio ** (k / (MASS_STEPS - 1));
  for (let k = 0; k < MASS_STEPS; k++) {
    const mass = massAt(k);
    const width = 0.5 * (massAt(Math.min(MASS_STEPS - 1, k + 1)) - massAt(Math.max(0, k - 1)));
    const star = agedStar(mass, each.turnOff);
    const temperature = star.temperature * (1 + each.temperatureShift);
    const flux = starAt(temperature, temperature < HOT_DWARF ? 4.5 : 4.2, each.metallicity);
    const weight = initialMassFunction(mass) * width * star.radius ** 2;
    for (let i = 0; i < length; i++) light[i]! += weight * flux[i]!;
  }
  return light;
}

function giantLight(
  starAt: StarAt,
  length: number,
  each: PopulationRecipe,
  unitBand: (flux: Float64Array) => Float64Array,
): Float64Array {
  const light = new Float64Array(length);
  for (const { temperature, logGravity, share } of each.giants) {
    const shifted = temperature * (1 + 0.5 * each.temperatureShift);
    const flux = unitBand(starAt(shifted, logGravity, each.metallicity));
    for (let i = 0; i < length; i++) light[i]! += share * flux[i]!;
  }
  return light;
}
