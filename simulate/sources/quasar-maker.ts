import { type RandomStream, seededRandom } from '../../pipeline/core/random.ts';
import { quasarReddening } from '../../templates/dust/quasar.ts';
import { dustTransmission } from '../../templates/dust/transmission.ts';
import type { LogGrid } from '../../templates/family.ts';
import { around, aroundDex, between, exponential } from '../draws.ts';
import { addBumps, type Bump, LIGHT_SPEED_KM_S, wavelengthOf } from '../rest-spectrum.ts';
import { forestTransmission } from './forest.ts';
import { IRON_MULTIPLETS, QUASAR_LINES, type QuasarLine } from './quasar-lines.ts';
import type { Source } from './source.ts';

/** From beyond the Lyman limit to where the red arm ends for the nearest quasar drawn. */
const GRID: LogGrid = gridBetween(760, 9000, Math.LN10 * 0.5e-4);
const REDSHIFTS = [0.25, 3.7] as const;
/** The break of the continuum's slope, ångström (Vanden Berk et al. 2001, AJ 122, 549). */
const BREAK_ANGSTROM = 4800;
/** Lyman α fluorescence leaves iron this strong beside the continuum at 2500 Å, at the mean. */
const IRON_SHARE = 0.2;
/** Balmer continuum beside the power law at its edge, at the mean (Grandi 1982, ApJ 255, 25; from memory). */
const BALMER_SHARE = 0.1;
const BALMER_EDGE_ANGSTROM = 3646;
/** One quasar in this many shows broad absorption; one in ten of a survey's do (from memory). */
const BROAD_ABSORPTION_SHARE = 0.08;

/** Velocity shifts, km/s, negative = towards us: high-ionisation lines come blueshifted (Gaskell 1982, ApJ 263, 79). */
const HIGH_IONISATION_SHIFT = [-500, 400] as const;
const OTHER_SHIFT = [0, 120] as const;

/**
 * Draws one quasar: broken power law, lines with drawn strengths, widths, shifts and asymmetry, iron multiplets,
 * Balmer continuum, reddening, and a Lyman α forest of its own.
 */
export function drawQuasar(random: RandomStream): Source {
  const redshift = between(random, ...REDSHIFTS);
  const blueSlope = around(random, -1.55, 0.3);
  const redSlope = around(random, -0.6, 0.4);
  const continuum = (wavelength: number): number =>
    (wavelength / BREAK_ANGSTROM) ** (wavelength < BREAK_ANGSTROM ? blueSlope : redSlope);
  const flux = new Float32Array(GRID.length);
  for (let i = 0; i < flux.length; i++) flux[i] = continuum(wavelengthOf(GRID, i));
  addBumps(flux, GRID, emissionLines(random, continuum));
  addBumps(flux, GRID, ironMultiplets(random, continuum));
  addBalmerContinuum(flux, aroundDex(random, BALMER_SHARE, 0.25) * continuum(BALMER_EDGE_ANGSTROM));
  if (random.uniform() < BROAD_ABSORPTION_SHARE) absorb(random, flux);
  const reddening = exponential(random, 0.03);
  const forest = forestTransmission(seededRandom(random.integer(2 ** 32)), GRID, redshift);
  for (let i = 0; i < flux.length; i++) {
    flux[i]! *= forest[i]! * dustTransmission(reddening * quasarReddening(wavelengthOf(GRID, i)));
  }
  return {
    kind: 'quasar',
    redshift,
    magnitude: between(random, 18, 20.8),
    spectrum: { grid: GRID, flux, sharpnessKmS: 0 },
  };
}

function gridBetween(fromAngstrom: number, toAngstrom: number, step: number): LogGrid {
  const length = Math.ceil(Math.log(toAngstrom / fromAngstrom) / step) + 1;
  return { lnStart: Math.log(fromAngstrom), step, length };
}

function emissionLines(random: RandomStream, continuum: (wavelength: number) => number): Bump[] {
  const width = aroundDex(random, 1, 0.13);
  const strength = {
    'high-ionisation': aroundDex(random, 1, 0.18),
    'low-ionisation': aroundDex(random, 1, 0.14),
    balmer: aroundDex(random, 1, 0.14),
    narrow: aroundDex(random, 1, 0.35),
  };
  const shift = {
    'high-ionisation': around(random, ...HIGH_IONISATION_SHIFT),
    'low-ionisation': around(random, ...OTHER_SHIFT),
    balmer: around(random, ...OTHER_SHIFT),
    narrow: 0,
  };
  // A narrower core and wider wings, displaced against each other, make lines peaked and lopsided.
  const coreShare = between(random, 0.4, 0.7);
  const wingShiftKmS = around(random, -200, 400);
  return QUASAR_LINES.flatMap((line: QuasarLine): Bump[] => {
    const flux =
      continuum(line.wavelength) * line.equivalentWidth * strength[line.origin] * aroundDex(random, 1, 0.1);
    const at = (velocityKmS: number): number => line.wavelength * (1 + velocityKmS / LIGHT_SPEED_KM_S);
    const velocity = shift[line.origin];
    if (line.origin === 'narrow') return [{ wavelength: at(velocity), sigmaKmS: line.sigmaKmS, flux }];
    return [
      { wavelength: at(velocity), sigmaKmS: 0.65 * width * line.sigmaKmS, flux: coreShare * flux },
      {
        wavelength: at(velocity + wingShiftKmS),
        sigmaKmS: 1.6 * width * line.sigmaKmS,
        flux: (1 - coreShare) * flux,
      },
    ];
  });
}

function ironMultiplets(random: RandomStream, continuum: (wavelength: number) => number): Bump[] {
  const strength = aroundDex(random, IRON_SHARE, 0.2) * continuum(2500);
  const optical = aroundDex(random, 1, 0.2);
  return IRON_MULTIPLETS.map(([wavelength, sigma, relative]) => {
    const peak = strength * relative * (wavelength > 4000 ? optical : 1) * aroundDex(random, 1, 0.08);
    return {
      wavelength,
      sigmaKmS: (sigma / wavelength) * LIGHT_SPEED_KM_S,
      flux: peak * Math.sqrt(2 * Math.PI) * sigma,
    };
  });
}

/** Optically thin Balmer continuum at 12,000 K (Grandi 1982, ApJ 255, 25), its edge softened by the broad series. */
function addBalmerContinuum(flux: Float32Array, atEdge: number): void {
  const temperature = 12_000;
  const secondRadiation = 1.438776877e8; // hc/k, ångström × kelvin
  const planck = (wavelength: number): number =>
    1 / (wavelength ** 5 * Math.expm1(secondRadiation / (wavelength * temperature)));
  const depth = (wavelength: number): number => -Math.expm1(-((wavelength / BALMER_EDGE_ANGSTROM) ** 3));
  const unit = planck(BALMER_EDGE_ANGSTROM) * depth(BALMER_EDGE_ANGSTROM);
  for (let i = 0; i < flux.length; i++) {
    const wavelength = wavelengthOf(GRID, i);
    const edge = 0.5 * (1 - Math.tanh((wavelength - BALMER_EDGE_ANGSTROM - 60) / 80));
    if (edge > 1e-6) flux[i]! += (atEdge * edge * planck(wavelength) * depth(wavelength)) / unit;
  }
}

/** A trough blueward of the strongest high-ionisation lines, from an outflow of 3,000 to 15,000 km/s. */
function absorb(random: RandomStream, flux: Float32Array): void {
  const velocity = between(random, 3000, 15_000);
  const sigma = between(random, 1000, 3500);
  const troughs = [
    [1549.06, 0.8],
    [1397.8, 0.5],
    [1240.14, 0.7],
    [1215.67, 0.4],
  ] as const;
  for (let i = 0; i < flux.length; i++) {
    const wavelength = wavelengthOf(GRID, i);
    for (const [rest, depth] of troughs) {
      const offset = ((wavelength / rest - 1) * LIGHT_SPEED_KM_S + velocity) / sigma;
      if (Math.abs(offset) < 5) flux[i]! *= 1 - depth * Math.exp(-0.5 * offset * offset);
    }
  }
}
