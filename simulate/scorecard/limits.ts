import { KINDS, type Kind } from '../../templates/family.ts';

/** How far off, in c Δz / (1+z), km/s, an answer may be and still count as right. */
export type RightLimits = (group: string, kind: Kind) => number;

/**
 * By kind: what spectra at R ≈ 2000 allow and users of each kind need. The calibrated confidence speaks of
 * the same limits.
 */
export const LIMITS_KM_S: Readonly<Record<Kind, number>> = { galaxy: 300, star: 100, quasar: 1500 };

/** Looser limits reported beside: for stars the larger of this and so many stated errors, and for quasars. */
export const BESIDE = { starKmS: 30, starErrors: 5, quasarKmS: 3000 } as const;

/**
 * Limits with exceptions, e.g. `star=150,faint-fields/galaxy=600`: a kind for all groups, or of one group.
 *
 * @throws RangeError when an exception does not read like that
 */
export function limitsWith(exceptions: string): RightLimits {
  const table = new Map<string, number>();
  for (const exception of exceptions.split(',').filter((text) => text.trim() !== '')) {
    const match = /^(?:(.+)\/)?([a-z]+)=([0-9.]+)$/.exec(exception.trim());
    const kind = KINDS.find((known) => known === match?.[2]);
    const limit = Number(match?.[3]);
    if (match === null || kind === undefined || !(limit > 0)) {
      throw new RangeError(`limits must be like star=150 or group/galaxy=600, got '${exception}'`);
    }
    table.set(`${match[1] ?? ''}/${kind}`, limit);
  }
  return (group, kind) => table.get(`${group}/${kind}`) ?? table.get(`/${kind}`) ?? LIMITS_KM_S[kind];
}
