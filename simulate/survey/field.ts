import { seededRandom, type RandomStream } from '../../pipeline/core/random.ts';
import type { Role } from '../../pipeline/decode/spectrum.ts';
import { between } from '../draws.ts';
import { CALIBRATION_SHARE, SKY_SHARE } from '../instrument/curlew.ts';
import { seedFor } from '../seeds.ts';
import type { Makers } from '../sources/makers.ts';
import type { Source } from '../sources/source.ts';

/** What the survey believes a target is when it puts a fibre on it; now and then it is wrong. */
export type TargetClass = 'bright-galaxy' | 'line-emitter' | 'quasar-candidate' | 'halo-star';

/** One fibre and what it is pointed at. */
export interface Aim {
  /** From 1. */
  readonly fibre: number;
  readonly targetName: string;
  readonly role: Role;
  /** Empty for sky and calibration fibres. */
  readonly targetClass: TargetClass | '';
  readonly raDeg: number;
  readonly decDeg: number;
  /** Null for a sky fibre. */
  readonly source: Source | null;
}

/** A pointing of the telescope. */
export interface Field {
  readonly name: string;
  readonly raDeg: number;
  readonly decDeg: number;
  readonly aims: readonly Aim[];
}

const CLASS_SHARES: readonly (readonly [TargetClass, number])[] = [
  ['bright-galaxy', 0.4],
  ['line-emitter', 0.2],
  ['quasar-candidate', 0.2],
  ['halo-star', 0.2],
];
/** Of quasar candidates chosen by colour this share are blue stars. */
const BLUE_STAR_SHARE = 0.15;

/** Where the first field lies: in the evening sky of early April, where the Earth's motion shows most. */
const FIRST_FIELD = { raDeg: 85, decDeg: -28 } as const;
/** Each further field rises as much later as the one before it takes, with a change of field. */
const FIELD_STEP_DEG = 30;
const FIELD_RADIUS_DEG = 0.75;

/**
 * Fibres of a field and what they are pointed at, in fibre order. Roles are dealt evenly over the fibres, as
 * every part of the field needs its sky and its calibration stars.
 *
 * @param number of the field, from 0
 * @param fibres ≥ 1
 */
export function makeField(seed: number, number: number, fibres: number, makers: Makers): Field {
  const raDeg = (FIRST_FIELD.raDeg + FIELD_STEP_DEG * number) % 360;
  const decDeg = FIRST_FIELD.decDeg - 4 * Math.floor(number / 4);
  const name = `LF-${String(number + 1).padStart(3, '0')}`;
  const place = seededRandom(seedFor(seed, number, 0));
  const aims = Array.from({ length: fibres }, (_, i): Aim => {
    const fibre = i + 1;
    const random = seededRandom(seedFor(seed, number, fibre));
    const role = roleOf(i);
    const targetClass = role === 'target' ? classOf(random) : '';
    const separation = FIELD_RADIUS_DEG * Math.sqrt(place.uniform());
    const angle = between(place, 0, 2 * Math.PI);
    return {
      fibre,
      targetName: `${name}-${role === 'sky' ? 'sky' : 'target'}-${String(fibre).padStart(3, '0')}`,
      role,
      targetClass,
      raDeg: raDeg + (separation * Math.cos(angle)) / Math.cos((decDeg * Math.PI) / 180),
      decDeg: decDeg + separation * Math.sin(angle),
      source: role === 'sky' ? null : sourceOf(random, role, targetClass, makers),
    };
  });
  return { name, raDeg, decDeg, aims };
}

/** Every tenth fibre looks at sky, every twentieth, five after it, at a calibration star. */
function roleOf(index: number): Role {
  const skyEvery = Math.round(1 / SKY_SHARE);
  const calibrationEvery = Math.round(1 / CALIBRATION_SHARE);
  if (index % skyEvery === 4) return 'sky';
  return index % calibrationEvery === 9 ? 'calibration' : 'target';
}

function classOf(random: RandomStream): TargetClass {
  let left = random.uniform();
  for (const [targetClass, share] of CLASS_SHARES) {
    if (left < share) return targetClass;
    left -= share;
  }
  return 'halo-star';
}

function sourceOf(random: RandomStream, role: Role, targetClass: TargetClass | '', makers: Makers): Source {
  if (role === 'calibration') return makers.stars.calibrationStar(random);
  switch (targetClass) {
    case 'bright-galaxy':
      return makers.galaxies.brightGalaxy(random);
    case 'line-emitter':
      return makers.galaxies.lineEmitter(random);
    case 'quasar-candidate':
      return random.uniform() < BLUE_STAR_SHARE ? makers.stars.blueStar(random) : makers.drawQuasar(random);
    default:
      return makers.stars.haloStar(random);
  }
}
