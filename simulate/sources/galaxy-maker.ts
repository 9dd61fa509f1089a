import type { RandomStream } from '../../pipeline/core/random.ts';
import { galacticExtinction } from '../../templates/dust/galactic.ts';
import { dustTransmission } from '../../templates/dust/transmission.ts';
import type { LogGrid } from '../../templates/family.ts';
import { GIANTS } from '../../templates/galaxies/giants.ts';
import { type PopulationRecipe, populationSpectra } from '../../templates/galaxies/population.ts';
import { broaden } from '../../templates/prepare/broaden.ts';
import type { StarGrid } from '../../templates/prepare/star-grid.ts';
import { around, aroundDex, between, betweenLog, exponential } from '../draws.ts';
import { addBumps, type Bump, LIGHT_SPEED_KM_S, meanIn, wavelengthOf } from '../rest-spectrum.ts';
import { nebularLines } from './nebula.ts';
import type { Source } from './source.ts';

/** Draws galaxies of mixed ages behind dust of the Galactic kind, which no galaxy family is made with. */
export interface GalaxyMaker {
  brightGalaxy(random: RandomStream): Source;
  /** Too faint to see but for its lines: continuum signal-to-noise about 0.5 per ångström. */
  lineEmitter(random: RandomStream): Source;
}

const inBetween = (
  name: string,
  age: number,
  turnOff: number,
  metallicity: number,
  giants: PopulationRecipe['giants'],
  giantShare: number,
): PopulationRecipe => ({
  name,
  age,
  turnOff,
  metallicity,
  giants,
  temperatureShift: -0.06 * metallicity,
  giantShare,
});

/** Ages and metallicities between those the families are made of, oldest first. */
const POPULATIONS_BETWEEN: readonly PopulationRecipe[] = [
  inBetween('11g rich', 11, 0.96, 0.15, GIANTS.old, 0.54),
  inBetween('7g', 7, 1.07, -0.2, GIANTS.old, 0.5),
  inBetween('4g', 4, 1.29, -0.1, GIANTS.intermediate, 0.48),
  inBetween('2g', 2, 1.65, -0.3, GIANTS.clump, 0.42),
  inBetween('800m', 0.8, 2.3, -0.2, GIANTS.clump, 0.3),
  inBetween('400m', 0.4, 2.95, 0, GIANTS.young, 0.22),
  inBetween('180m', 0.18, 4.2, 0, GIANTS.young, 0.17),
  inBetween('60m', 0.06, 7, 0, GIANTS.young, 0.12),
  inBetween('10m', 0.01, 19, 0, GIANTS.young, 0.04),
];
/** The first three of the list: what an early-type galaxy is mixed of. */
const OLD_POPULATIONS = 3;

/** Fraction of bright galaxies that form stars (common practice, no source). */
const STAR_FORMING_SHARE = 0.55;
const EARLY_DISPERSION_KM_S = [110, 300] as const;
const LATE_DISPERSION_KM_S = [50, 150] as const;

/** @param stars the models populations are mixed of */
export function galaxyMaker(stars: StarGrid): GalaxyMaker {
  const { grid } = stars;
  const populations = populationSpectra(stars, POPULATIONS_BETWEEN);
  const mixed = (weights: readonly number[], dispersionKmS: number, dust: (w: number) => number) => {
    const sum = new Float32Array(grid.length);
    weights.forEach((weight, k) => {
      const light = populations[k]!;
      for (let i = 0; i < sum.length; i++) sum[i]! += weight * light[i]!;
    });
    const broadened = broaden(sum, dispersionKmS / LIGHT_SPEED_KM_S / grid.step);
    return broadened.map((value, i) => value * dust(wavelengthOf(grid, i)));
  };
  return {
    brightGalaxy(random) {
      const formsStars = random.uniform() < STAR_FORMING_SHARE;
      const dust = dustScreen(random, formsStars ? 0.5 : 0.1);
      const [slowest, fastest] = formsStars ? LATE_DISPERSION_KM_S : EARLY_DISPERSION_KM_S;
      const flux = mixed(
        POPULATIONS_BETWEEN.map((_, k) => {
          if (!formsStars && k >= OLD_POPULATIONS) return 0;
          return exponential(random, formsStars ? 1 / (1 + 0.5 * k) : 1);
        }),
        between(random, slowest, fastest),
        dust,
      );
      // Hα equivalent width, ångström: star-forming discs, or the weak lines of old galaxies.
      const width = formsStars ? aroundDex(random, 20, 0.35) : aroundDex(random, 0.6, 0.3);
      addBumps(flux, grid, scaledToHAlpha(grid, flux, nebularLines(random, dust), width));
      return {
        kind: 'galaxy',
        redshift: Math.max(0.004, Math.abs(around(random, 0.12, 0.09))),
        magnitude: between(random, 16.8, 19.4),
        spectrum: { grid, flux, sharpnessKmS: 0 },
      };
    },
    lineEmitter(random) {
      const dust = dustScreen(random, 0.3);
      const flux = mixed(
        POPULATIONS_BETWEEN.map((_, k) => (k < 5 ? 0 : exponential(random, 1))),
        between(random, ...LATE_DISPERSION_KM_S),
        dust,
      );
      const width = betweenLog(random, 30, 400);
      addBumps(flux, grid, scaledToHAlpha(grid, flux, nebularLines(random, dust), width));
      return {
        kind: 'galaxy',
        redshift: between(random, 0.03, 1.45),
        magnitude: between(random, 22.6, 23.8),
        spectrum: { grid, flux, sharpnessKmS: 0 },
      };
    },
  };
}

function dustScreen(random: RandomStream, meanAmount: number): (wavelengthAngstrom: number) => number {
  const amount = exponential(random, meanAmount);
  const ratio = between(random, 2.6, 4);
  return (wavelength) => dustTransmission(amount * galacticExtinction(wavelength, ratio));
}

/** Scales lines so that Hα has the equivalent width asked for, ångström, above the starlight beside it. */
function scaledToHAlpha(
  grid: LogGrid,
  flux: Float32Array,
  lines: readonly Bump[],
  equivalentWidth: number,
): Bump[] {
  const beside = meanIn(grid, flux, 6600, 6680);
  const present = lines
    .filter(({ wavelength }) => Math.abs(wavelength - 6564.6) < 4)
    .reduce((sum, line) => sum + line.flux, 0);
  const factor = (equivalentWidth * beside) / present;
  return lines.map((line) => ({ ...line, flux: line.flux * factor }));
}
