import type { CatalogueRow, NightReason, TargetRecord } from '../store/index.ts';
import { byCodeUnit } from '../store/index.ts';
import type { Kind } from '../templates/family.ts';

const SPEED_OF_LIGHT_KM_S = 299_792.458;

/** How far apart two right answers of one kind may lie: the limits that `confidence` speaks of. */
const RIGHT_WITHIN_KM_S: Readonly<Record<Kind, number>> = { galaxy: 300, star: 100, quasar: 1_500 };

/**
 * A clash needs two answers that each claim something; below this an answer claims next to nothing, and
 * every faint repeat would clash.
 */
const LEAST_CONFIDENCE = 0.5;

/**
 * Gathers the spectra of each named target and finds those whose answers contradict each other.
 *
 * @param rows in spectrum-id order
 * @returns a `repeat-clash` for every spectrum of a contradiction, and one target record per target
 */
export function findClashes(rows: readonly CatalogueRow[]): {
  reasons: NightReason[];
  targets: TargetRecord[];
} {
  const byTarget = new Map<string, CatalogueRow[]>();
  for (const row of rows) {
    if (row.role === 'sky') continue;
    const key = row.target_name ?? row.spectrum_id;
    const group = byTarget.get(key) ?? [];
    group.push(row);
    byTarget.set(key, group);
  }
  const reasons: NightReason[] = [];
  const targets: TargetRecord[] = [];
  for (const [targetKey, group] of byTarget) {
    const clashing = new Set<string>();
    for (const [i, a] of group.entries()) {
      for (const b of group.slice(i + 1)) {
        if (!contradict(a, b)) continue;
        reasons.push(reasonFor(a, b, clashing), reasonFor(b, a, clashing));
      }
    }
    const best = group.toSorted((a, b) => (b.confidence ?? -1) - (a.confidence ?? -1))[0]!;
    targets.push({
      targetKey,
      targetName: best.target_name,
      raDeg: best.ra,
      decDeg: best.dec,
      spectra: group.length,
      kind: clashing.size > 0 ? null : best.kind,
      redshift: clashing.size > 0 ? null : best.redshift,
      clash: clashing.size > 0,
    });
  }
  const first = new Map<string, NightReason>();
  for (const reason of reasons) if (!first.has(reason.spectrumId)) first.set(reason.spectrumId, reason);
  return {
    reasons: [...first.values()].sort(byCodeUnit((reason) => reason.spectrumId)),
    targets: targets.sort(byCodeUnit((target) => target.targetKey)),
  };
}

/** Of another kind, or of one kind and further apart than both can be right. */
function contradict(a: CatalogueRow, b: CatalogueRow): boolean {
  if (a.kind === null || b.kind === null || a.redshift === null || b.redshift === null) return false;
  if ((a.confidence ?? 0) < LEAST_CONFIDENCE || (b.confidence ?? 0) < LEAST_CONFIDENCE) return false;
  // Each may be off by its kind's limit, so two right answers differ by twice that at most.
  return a.kind !== b.kind || apartKmS(a.redshift, b.redshift) > 2 * RIGHT_WITHIN_KM_S[a.kind];
}

function apartKmS(a: number, b: number): number {
  return (SPEED_OF_LIGHT_KM_S * Math.abs(a - b)) / (1 + Math.min(a, b));
}

function reasonFor(row: CatalogueRow, other: CatalogueRow, clashing: Set<string>): NightReason {
  clashing.add(row.spectrum_id);
  const differenceKmS = apartKmS(row.redshift!, other.redshift!);
  return {
    spectrumId: row.spectrum_id,
    reason: {
      word: 'repeat-clash',
      weight: 'look',
      sentence: `${other.spectrum_id}, of the same target, says ${other.kind} at ${other.redshift!.toFixed(5)}`,
      numbers: { otherRedshift: other.redshift!, differenceKmS },
    },
  };
}
