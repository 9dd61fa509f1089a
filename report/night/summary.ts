import type { CatalogueRow } from '../../store/catalogue-row.ts';
import type { NightFacts } from '../../store/night-reader.ts';
import type { Kind } from '../../templates/family.ts';
import { fibreTallies, oddFibres } from './fibres.ts';
import type { FibreTally, OddFibre } from './fibres.ts';
import { outcomeOf } from './outcome.ts';
import type { Outcome } from './outcome.ts';
import { proportion } from './proportion.ts';
import type { Proportion } from './proportion.ts';
import { reasonWords } from './reason-meanings.ts';

export type OutcomeCounts = Readonly<Record<Outcome, number>>;

/** Success in one range of signal-to-noise, [from, to). */
export interface SuccessBin {
  readonly from: number;
  readonly to: number;
  readonly accepted: Proportion;
}

/** The numbers on the report's first page. */
export interface NightSummary {
  readonly expected: number;
  readonly rows: number;
  /** Expected spectra without a row. */
  readonly missing: number;
  readonly outcomes: OutcomeCounts;
  readonly byKind: readonly { readonly kind: Kind | null; readonly counts: OutcomeCounts }[];
  readonly byClass: readonly { readonly targetClass: string; readonly counts: OutcomeCounts }[];
  /** Confidence of every target with an answer, by what came of it. */
  readonly confidences: Readonly<Record<'accepted' | 'flagged', readonly number[]>>;
  /** Redshifts of accepted galaxies and quasars. */
  readonly redshifts: Readonly<Record<'galaxy' | 'quasar', readonly number[]>>;
  /** Velocities of accepted stars, km/s. */
  readonly starVelocities: readonly number[];
  readonly success: readonly SuccessBin[];
  /** How many spectra carry each reason, most frequent first. */
  readonly reasons: readonly { readonly word: string; readonly count: number }[];
  readonly fibres: readonly FibreTally[];
  readonly oddFibres: readonly OddFibre[];
}

/** Edges in signal-to-noise per ångström: factors of about 1.7 from hopeless to comfortable. */
const SNR_EDGES: readonly number[] = [0, 0.5, 1, 2, 3, 5, 10, 20, 50, Infinity];

/** Order of the rows; null = no answer. */
const KIND_ORDER: readonly (Kind | null)[] = ['galaxy', 'quasar', 'star', null];

const NO_CLASS = '(none given)';

/** Counts a night. Cost: linear in rows. */
export function summarise(facts: NightFacts, rows: readonly CatalogueRow[]): NightSummary {
  const judged = rows.map((row) => ({ row, outcome: outcomeOf(row) }));
  const objects = judged.filter(({ outcome }) => outcome !== 'sky');
  const withAnswer = judged.filter(({ outcome }) => outcome === 'accepted' || outcome === 'flagged');
  const accepted = rows.filter((row) => outcomeOf(row) === 'accepted');
  const confidencesOf = (wanted: Outcome): number[] =>
    present(judged.filter(({ outcome }) => outcome === wanted).map(({ row }) => row.confidence));
  const redshiftsOf = (kind: Kind): number[] =>
    present(accepted.filter((row) => row.kind === kind).map((row) => row.redshift));
  const fibres = fibreTallies(rows);

  return {
    expected: facts.expected,
    rows: rows.length,
    missing: Math.max(0, facts.expected - rows.length),
    outcomes: count(judged),
    byKind: KIND_ORDER.map((kind) => ({
      kind,
      counts: count(objects.filter(({ row }) => row.kind === kind)),
    })),
    byClass: [...groupBy(objects, ({ row }) => row.target_class ?? NO_CLASS)]
      .map(([targetClass, members]) => ({ targetClass, counts: count(members) }))
      .sort((a, b) => (a.targetClass < b.targetClass ? -1 : 1)),
    confidences: { accepted: confidencesOf('accepted'), flagged: confidencesOf('flagged') },
    redshifts: { galaxy: redshiftsOf('galaxy'), quasar: redshiftsOf('quasar') },
    starVelocities: present(accepted.filter((row) => row.kind === 'star').map((row) => row.velocity_km_s)),
    success: SNR_EDGES.slice(0, -1).map((from, i) => {
      const to = SNR_EDGES[i + 1]!;
      const inside = withAnswer.filter(({ row }) => within(row.signal_to_noise_per_angstrom, from, to));
      const hits = inside.filter(({ outcome }) => outcome === 'accepted').length;
      return { from, to, accepted: proportion(hits, inside.length) };
    }),
    reasons: countReasons(objects.map(({ row }) => row)),
    fibres,
    oddFibres: oddFibres(fibres),
  };
}

/** A signal-to-noise below zero (an over-subtracted sky) belongs to the lowest bin. */
function within(value: number | null, from: number, to: number): boolean {
  return value !== null && (value >= from || from === 0) && value < to;
}

function count(judged: readonly { readonly outcome: Outcome }[]): OutcomeCounts {
  const counts = { accepted: 0, flagged: 0, unreadable: 0, sky: 0 };
  for (const { outcome } of judged) counts[outcome]++;
  return counts;
}

function countReasons(rows: readonly CatalogueRow[]): { word: string; count: number }[] {
  const counts = new Map<string, number>();
  for (const row of rows) {
    for (const word of reasonWords(row.reasons)) counts.set(word, (counts.get(word) ?? 0) + 1);
  }
  return [...counts]
    .map(([word, n]) => ({ word, count: n }))
    .sort((a, b) => b.count - a.count || (a.word < b.word ? -1 : 1));
}

function present(values: readonly (number | null)[]): number[] {
  return values.filter((value): value is number => value !== null && Number.isFinite(value));
}

function groupBy<T>(items: readonly T[], keyOf: (item: T) => string): Map<string, T[]> {
  const groups = new Map<string, T[]>();
  for (const item of items) {
    const key = keyOf(item);
    const group = groups.get(key);
    if (group === undefined) groups.set(key, [item]);
    else group.push(item);
  }
  return groups;
}
