import type { RandomStream } from '../../pipeline/core/random.ts';
import { galacticExtinction } from '../../templates/dust/galactic.ts';
import { dustTransmission } from '../../templates/dust/transmission.ts';
import { starsBetween } from '../../templates/galaxies/star-between.ts';
import { broaden } from '../../templates/prepare/broaden.ts';
import type { StarGrid } from '../../templates/prepare/star-grid.ts';
import { STORED_SIGMA_KM_S } from '../../templates/stars/stored-grid.ts';
import { around, between, exponential } from '../draws.ts';
import { LIGHT_SPEED_KM_S, type RestSpectrum, wavelengthOf } from '../rest-spectrum.ts';
import type { Source } from './source.ts';

/** Draws stars whose parameters lie between those of any grid. */
export interface StarMaker {
  /** Old, metal-poor, fast: turn-off stars, giants and blue horizontal-branch stars. */
  haloStar(random: RandomStream): Source;
  /** A bright F or G dwarf of the solar neighbourhood. */
  calibrationStar(random: RandomStream): Source;
  /** Blue stars that surveys take for quasars. */
  blueStar(random: RandomStream): Source;
}

/** Mean and spread of the halo's velocities far from the plane, km/s (Bond et al. 2010, ApJ 716, 1; from memory). */
const HALO_VELOCITY = [120, 130] as const;
const DISC_VELOCITY = [10, 40] as const;

/**
 * @param stars the models the parameters are interpolated between; the spectra in between are no member of
 *   any template family
 */
export function starMaker(stars: StarGrid): StarMaker {
  const starAt = starsBetween(stars);
  const source = (
    random: RandomStream,
    [temperature, logGravity, metallicity]: readonly [number, number, number],
    velocity: readonly [number, number],
    magnitude: number,
  ): Source => {
    const light = starAt(temperature, logGravity, metallicity);
    return {
      kind: 'star',
      redshift: around(random, ...velocity) / LIGHT_SPEED_KM_S,
      magnitude,
      spectrum: reddenedStar(random, stars, light),
    };
  };
  return {
    haloStar: (random) => source(random, haloParameters(random), HALO_VELOCITY, between(random, 15.5, 19.3)),
    calibrationStar: (random) =>
      source(
        random,
        [between(random, 5600, 6600), 4.3, between(random, -0.8, 0.1)],
        DISC_VELOCITY,
        between(random, 14.8, 16.3),
      ),
    blueStar: (random) =>
      source(
        random,
        [between(random, 6200, 13_000), 4.2, between(random, -1, 0)],
        HALO_VELOCITY,
        between(random, 18, 20),
      ),
  };
}

function haloParameters(random: RandomStream): readonly [number, number, number] {
  const metallicity = Math.min(-0.4, Math.max(-1.95, around(random, -1.4, 0.4)));
  const share = random.uniform();
  if (share < 0.6) return [between(random, 5400, 6700), 4.3, metallicity];
  if (share < 0.9) return [between(random, 4500, 5500), between(random, 1.8, 3.2), metallicity];
  return [between(random, 7400, 9800), 4.2, metallicity];
}

function reddenedStar(random: RandomStream, { grid }: StarGrid, light: Float64Array): RestSpectrum {
  const amount = exponential(random, 0.15);
  const ratio = between(random, 2.6, 3.6);
  // Rotation and turbulence, drawn as one Gaussian on top of the width the models are stored with.
  const rotation = exponential(random, 12);
  const broadened = broaden(light, rotation / LIGHT_SPEED_KM_S / grid.step);
  const flux = broadened.map(
    (value, i) => value * dustTransmission(amount * galacticExtinction(wavelengthOf(grid, i), ratio)),
  );
  return { grid, flux, sharpnessKmS: Math.hypot(STORED_SIGMA_KM_S, rotation) };
}
