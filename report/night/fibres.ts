import type { CatalogueRow } from '../../store/catalogue-row.ts';
import { outcomeOf } from './outcome.ts';
import { binomialTail } from './proportion.ts';

/** What came of the spectra of one fibre over the night, sky spectra left out. */
export interface FibreTally {
  readonly fibre: number;
  readonly accepted: number;
  /** Flagged or unreadable. */
  readonly failed: number;
}

/** A fibre that fails more than chance allows. */
export interface OddFibre extends FibreTally {
  /** Chance of so many failures if the fibre failed like the night as a whole. */
  readonly chance: number;
}

/**
 * A fibre is named when chance would name fewer than one in twenty nights: the level is shared over the fibres
 * (Bonferroni), so that a night of 240 good fibres stays silent.
 */
const NIGHT_LEVEL = 0.05;

/** Tallies by fibre number, ascending; rows without a fibre number are left out. */
export function fibreTallies(rows: readonly CatalogueRow[]): readonly FibreTally[] {
  const tallies = new Map<number, { accepted: number; failed: number }>();
  for (const row of rows) {
    const outcome = outcomeOf(row);
    if (row.fibre === null || outcome === 'sky') continue;
    const tally = tallies.get(row.fibre) ?? { accepted: 0, failed: 0 };
    if (outcome === 'accepted') tally.accepted++;
    else tally.failed++;
    tallies.set(row.fibre, tally);
  }
  return [...tallies].map(([fibre, tally]) => ({ fibre, ...tally })).sort((a, b) => a.fibre - b.fibre);
}

/** Fibres whose failures chance does not explain, least likely first. */
export function oddFibres(tallies: readonly FibreTally[]): readonly OddFibre[] {
  const failed = tallies.reduce((sum, tally) => sum + tally.failed, 0);
  const all = tallies.reduce((sum, tally) => sum + tally.failed + tally.accepted, 0);
  return tallies
    .map((tally) => ({
      ...tally,
      chance: binomialTail(tally.failed, tally.failed + tally.accepted, failed / all),
    }))
    .filter((fibre) => fibre.chance < NIGHT_LEVEL / tallies.length)
    .sort((a, b) => a.chance - b.chance);
}
