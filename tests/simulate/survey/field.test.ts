import { expect, it } from 'vitest';
import { makeField } from '../../../simulate/survey/field.ts';
import type { Makers } from '../../../simulate/sources/makers.ts';
import type { Source } from '../../../simulate/sources/source.ts';

/** A maker that names what was asked of it, since only the choice is looked at here. */
const made = (magnitude: number) => (): Source => ({
  kind: 'star',
  redshift: 0,
  magnitude,
  spectrum: { grid: { lnStart: 8, step: 1e-4, length: 2 }, flux: new Float32Array(2), sharpnessKmS: 0 },
});
const ASKED = { haloStar: 1, calibrationStar: 2, blueStar: 3, brightGalaxy: 4, lineEmitter: 5, quasar: 6 };
const MAKERS: Makers = {
  stars: {
    haloStar: made(ASKED.haloStar),
    calibrationStar: made(ASKED.calibrationStar),
    blueStar: made(ASKED.blueStar),
  },
  galaxies: { brightGalaxy: made(ASKED.brightGalaxy), lineEmitter: made(ASKED.lineEmitter) },
  drawQuasar: made(ASKED.quasar),
};
const { aims, raDeg, decDeg } = makeField(1, 0, 240, MAKERS);

it('of 240 fibres 24 look at sky, 12 at calibration stars and 204 at targets', () => {
  const counted = (['sky', 'calibration', 'target'] as const).map(
    (wanted) => aims.filter(({ role }) => role === wanted).length,
  );
  expect(counted).toEqual([24, 12, 204]);
});

it('a fibre holds what its role and class ask for; some quasar candidates are blue stars', () => {
  const asked = (name: string): Set<number | undefined> =>
    new Set(
      aims.filter((aim) => (aim.targetClass || aim.role) === name).map(({ source }) => source?.magnitude),
    );
  expect(asked('sky')).toEqual(new Set([undefined]));
  expect(asked('calibration')).toEqual(new Set([ASKED.calibrationStar]));
  expect(asked('bright-galaxy')).toEqual(new Set([ASKED.brightGalaxy]));
  expect(asked('line-emitter')).toEqual(new Set([ASKED.lineEmitter]));
  expect(asked('halo-star')).toEqual(new Set([ASKED.haloStar]));
  expect(asked('quasar-candidate')).toEqual(new Set([ASKED.quasar, ASKED.blueStar]));
});

it('targets have names of their own and lie within 0.75 degrees of the centre', () => {
  expect(new Set(aims.map(({ targetName }) => targetName)).size).toBe(240);
  const separations = aims.map((aim) =>
    Math.hypot((aim.raDeg - raDeg) * Math.cos((decDeg * Math.PI) / 180), aim.decDeg - decDeg),
  );
  expect(Math.max(...separations)).toBeLessThanOrEqual(0.75);
});
