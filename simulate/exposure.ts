import { seededRandom } from '../pipeline/core/random.ts';
import { CURLEW_ARMS, type CurlewArm } from './instrument/curlew.ts';
import { drawFlaws, drawSkyBrightness } from './instrument/flaws.ts';
import { lightInArm, type ObservedArm, observeArm, type Observing } from './instrument/observe.ts';
import { QUALITY } from './instrument/quality.ts';
import { LIGHT_SPEED_KM_S } from './rest-spectrum.ts';
import { seedFor } from './seeds.ts';
import type { Aim, Field } from './survey/field.ts';

/** When, how long and through how much air. */
export interface ExposureConditions {
  /** Unique within the survey. */
  readonly id: string;
  /** Whole number that no other exposure of the survey has, for its own chance. */
  readonly number: number;
  /** Middle of the exposure, Modified Julian Date, UTC. */
  readonly midMjd: number;
  readonly exposureS: number;
  readonly airmass: number;
}

/** One exposure of a field: a row per fibre in each arm. */
export interface Exposure {
  readonly field: Field;
  readonly conditions: ExposureConditions;
  readonly arms: readonly { readonly arm: CurlewArm; readonly rows: readonly ObservedArm[] }[];
  /** How many fibres are dead or half covered: fibre number → what befell it. */
  readonly mishaps: ReadonlyMap<number, Mishap>;
}

/** `dead`: no light reaches the detector. `half-covered`: the red arm sees nothing. */
export type Mishap = 'dead' | 'half-covered';

/** Velocity of the observatory towards a position, km/s: turns barycentric redshifts into observed ones. */
export type ObserverVelocity = (midMjd: number, raDeg: number, decDeg: number) => number;

/**
 * Exposes a field. Wavelengths are those at the telescope: the Earth's motion is in the data, with
 * 1 + z_observed = (1 + z) / (1 + v/c) (Wright & Eastman 2014, PASP 126, 838).
 *
 * @param seed of the whole survey
 */
export function expose(
  seed: number,
  field: Field,
  conditions: ExposureConditions,
  observerVelocity: ObserverVelocity,
): Exposure {
  const random = seededRandom(seedFor(seed, conditions.number, 1));
  const sky = drawSkyBrightness(random, conditions.airmass);
  const flaws = drawFlaws(random, field.aims.length, conditions.airmass);
  const mishaps = drawMishaps(seed, field);
  const arms = CURLEW_ARMS.map((arm) => ({
    arm,
    rows: field.aims.map((aim, i) => {
      const velocity = observerVelocity(conditions.midMjd, aim.raDeg, aim.decDeg);
      const chance = seededRandom(seedFor(seed, conditions.number, aim.fibre, arm.pixels));
      const observing: Observing = { ...conditions, sky, flaws: flaws[i]! };
      const row = observeArm(chance, arm, lightOf(aim, arm, velocity, observing), observing);
      return afterMishap(row, arm, mishaps.get(aim.fibre));
    }),
  }));
  return { field, conditions, arms, mishaps };
}

function lightOf({ source }: Aim, arm: CurlewArm, velocityKmS: number, { flaws }: Observing): Float64Array {
  if (source === null) return new Float64Array(arm.pixels);
  const shift = (1 + source.redshift) / (1 + velocityKmS / LIGHT_SPEED_KM_S);
  return lightInArm(source, arm, shift, flaws.spreadFactor);
}

/** Two fibres of the spectrograph are broken, whatever they are pointed at: the same in every field. */
function drawMishaps(seed: number, { aims }: Field): Map<number, Mishap> {
  const targets = aims.filter(({ role }) => role === 'target');
  if (targets.length < 2) return new Map();
  const random = seededRandom(seedFor(seed, 2));
  const first = random.integer(targets.length);
  const second = (first + 1 + random.integer(targets.length - 1)) % targets.length;
  return new Map([
    [targets[first]!.fibre, 'dead'],
    [targets[second]!.fibre, 'half-covered'],
  ]);
}

/** What a reduction writes for pixels without light: zero flux, no error, marked. */
function afterMishap(row: ObservedArm, arm: CurlewArm, mishap: Mishap | undefined): ObservedArm {
  if (mishap === undefined || (mishap === 'half-covered' && arm.name === 'BLUE')) return row;
  const nothing = new Float32Array(arm.pixels);
  const mark = mishap === 'dead' ? QUALITY.dead : QUALITY.vignetted;
  return { ...row, flux: nothing, error: nothing, quality: new Uint8Array(arm.pixels).fill(mark) };
}
