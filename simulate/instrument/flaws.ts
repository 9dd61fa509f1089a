import type { RandomStream } from '../../pipeline/core/random.ts';
import { around, between, betweenLog, poisson } from '../draws.ts';
import type { SkyBrightness } from './sky-light.ts';

/** What is wrong with one fibre in one exposure beyond photon noise. */
export interface FibreFlaws {
  /** Flux of the blue arm relative to the red. */
  readonly armStep: number;
  /** Colour error: flux is multiplied by (λ/6500 Å) to this power. */
  readonly tilt: number;
  readonly ripple: { readonly amplitude: number; readonly periodAngstrom: number; readonly phase: number };
  /** Relative error of the correction for absorption by the air. */
  readonly bandError: number;
  /** Line spread relative to the mean of all fibres. */
  readonly spreadFactor: number;
  /** Relative error of the sky that was subtracted, and its displacement in pixels. */
  readonly skyScaleError: number;
  readonly skyShiftPixels: number;
}

/** Spread of the relative sky error between fibres, and how much of it a fibre shares with its neighbour. */
const SKY_SCALE_ERROR = 0.01;
const SKY_NEIGHBOUR_SHARE = 0.6;
const SKY_SHIFT_ERROR_PIXELS = 0.015;

/**
 * Flaws of all fibres of an exposure, in fibre order. Sky errors run from fibre to fibre as a chain
 * (autoregressive, so that neighbours are alike), because neighbours share a piece of detector.
 *
 * @param airmass light lost to atmospheric dispersion grows with it
 */
export function drawFlaws(random: RandomStream, fibres: number, airmass: number): FibreFlaws[] {
  let skyScale = random.normal();
  let skyShift = random.normal();
  const onward = (previous: number): number =>
    SKY_NEIGHBOUR_SHARE * previous + Math.sqrt(1 - SKY_NEIGHBOUR_SHARE ** 2) * random.normal();
  return Array.from({ length: fibres }, () => {
    skyScale = onward(skyScale);
    skyShift = onward(skyShift);
    return {
      armStep: around(random, 1, 0.06),
      tilt: around(random, 0.2 * (airmass - 1), 0.1),
      ripple: {
        amplitude: between(random, 0.002, 0.02),
        periodAngstrom: between(random, 120, 400),
        phase: between(random, 0, 2 * Math.PI),
      },
      bandError: around(random, 0, 0.1),
      spreadFactor: around(random, 1, 0.03),
      skyScaleError: SKY_SCALE_ERROR * skyScale,
      skyShiftPixels: SKY_SHIFT_ERROR_PIXELS * skyShift,
    };
  });
}

/** The sky of one exposure: hydroxyl lines vary most, oxygen lines fade through the night. */
export function drawSkyBrightness(random: RandomStream, airmass: number): SkyBrightness {
  // The glowing layer is seen through a longer path away from the zenith.
  const path = airmass ** 0.8;
  return {
    continuum: path * between(random, 0.9, 1.2),
    hydroxyl: path * between(random, 0.7, 1.5),
    oxygen: path * between(random, 0.6, 1.4),
    other: between(random, 0.8, 1.2),
  };
}

/** A cosmic-ray track along a spectrum. */
export interface CosmicRay {
  readonly pixel: number;
  /** Pixels it covers, 1 to 4. */
  readonly width: number;
  /** Height in units of the local noise. */
  readonly height: number;
  /** Whether the reduction found it and marked its pixels. */
  readonly found: boolean;
}

/** Tracks in one arm of one fibre in half an hour, and the share an ordinary rejection misses (from memory). */
const RAYS_PER_ARM = 5;
const MISSED_SHARE = 0.1;

export function drawCosmicRays(random: RandomStream, pixels: number): CosmicRay[] {
  return Array.from({ length: poisson(random, RAYS_PER_ARM) }, () => {
    const found = random.uniform() > MISSED_SHARE;
    return {
      pixel: random.integer(pixels),
      width: 1 + random.integer(4),
      height: found ? betweenLog(random, 10, 200) : betweenLog(random, 5, 25),
      found,
    };
  });
}
