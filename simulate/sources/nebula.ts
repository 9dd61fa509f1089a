import type { RandomStream } from '../../pipeline/core/random.ts';
import { REST_WAVELENGTHS as REST } from '../../templates/lines/rest-wavelengths.ts';
import { around, aroundDex, between } from '../draws.ts';
import type { Bump } from '../rest-spectrum.ts';

/** Case B at 10,000 K and 100 cm⁻³ relative to Hβ: Storey & Hummer 1995 (MNRAS 272, 41). */
const BALMER: readonly (readonly [wavelength: number, toHBeta: number])[] = [
  [REST.hydrogenAlpha, 2.863],
  [REST.hydrogenBeta, 1],
  [REST.hydrogenGamma, 0.468],
  [REST.hydrogenDelta, 0.259],
  [REST.hydrogenEpsilon, 0.159],
  [REST.hydrogen8, 0.105],
  [REST.hydrogen9, 0.073],
];

/** [O III] 5007/4959 (Storey & Zeippen 2000, MNRAS 312, 813) and [N II] 6583/6548, set by radiative rates. */
const OXYGEN3_RATIO = 2.98;
const NITROGEN2_RATIO = 3.0;
/** Ranges that density leaves to the doublets: 3729/3726 and 6716/6731 (Osterbrock & Ferland 2006, fig. 5.8). */
const OXYGEN2_RATIO = [0.5, 1.45] as const;
const SULPHUR2_RATIO = [0.6, 1.43] as const;

/** How the gas of one galaxy moves: one or two Gaussian parts, so that lines are not the families' own shape. */
interface Motion {
  readonly velocityKmS: number;
  readonly sigmaKmS: number;
  readonly share: number;
}

/**
 * Emission lines of ionised gas with ratios drawn freely within what atoms allow. Line ratios scatter about
 * those of star-forming galaxies (Kewley & Dopita 2002 grids; the scatter is common practice, no source).
 *
 * @param transmission fraction of light dust lets through at a rest wavelength
 * @returns lines whose Hβ, before dust, has flux 1
 */
export function nebularLines(
  random: RandomStream,
  transmission: (wavelengthAngstrom: number) => number,
): Bump[] {
  const motions = gasMotions(random);
  const oxygen3 = aroundDex(random, 1.2, 0.4);
  const oxygen2 = aroundDex(random, 2.8, 0.2);
  const oxygen2Ratio = between(random, ...OXYGEN2_RATIO);
  const nitrogen2 = Math.min(2.5, aroundDex(random, 0.7, 0.3));
  const sulphur2 = aroundDex(random, 0.7, 0.15);
  const sulphur2Ratio = between(random, ...SULPHUR2_RATIO);
  const lines: (readonly [number, number])[] = [
    ...BALMER,
    [REST.oxygenIII5007, oxygen3],
    [REST.oxygenIII4959, oxygen3 / OXYGEN3_RATIO],
    [REST.oxygenII3729, (oxygen2 * oxygen2Ratio) / (1 + oxygen2Ratio)],
    [REST.oxygenII3726, oxygen2 / (1 + oxygen2Ratio)],
    [REST.nitrogenII6583, nitrogen2],
    [REST.nitrogenII6548, nitrogen2 / NITROGEN2_RATIO],
    [REST.sulphurII6716, (sulphur2 * sulphur2Ratio) / (1 + sulphur2Ratio)],
    [REST.sulphurII6731, sulphur2 / (1 + sulphur2Ratio)],
    [REST.neonIII3869, 0.25 * oxygen3 * aroundDex(random, 0.4, 0.15)],
    [REST.heliumI5876, aroundDex(random, 0.11, 0.08)],
    [REST.oxygenI6300, aroundDex(random, 0.08, 0.2)],
    [REST.sulphurIII9069, aroundDex(random, 0.25, 0.15)],
    [REST.sulphurIII9531, aroundDex(random, 0.6, 0.15)],
  ];
  return lines.flatMap(([wavelength, toHBeta]) =>
    motions.map(({ velocityKmS, sigmaKmS, share }) => ({
      wavelength: wavelength * (1 + velocityKmS / 299_792.458),
      sigmaKmS,
      flux: toHBeta * share * transmission(wavelength),
    })),
  );
}

/** A fifth of the galaxies show two parts of a turning disc; their mean velocity stays that of the galaxy. */
function gasMotions(random: RandomStream): Motion[] {
  const sigmaKmS = Math.max(45, around(random, 75, 25));
  if (random.uniform() > 0.2) return [{ velocityKmS: 0, sigmaKmS, share: 1 }];
  const half = between(random, 50, 130);
  const near = between(random, 0.4, 0.6);
  return [
    { velocityKmS: -half * 2 * (1 - near), sigmaKmS, share: near },
    { velocityKmS: half * 2 * near, sigmaKmS, share: 1 - near },
  ];
}
