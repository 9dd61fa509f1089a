import type { CatalogueRow } from '../../store/catalogue-row.ts';
import { reasonWords } from './reason-meanings.ts';

/**
 * What came of one spectrum: exactly one of these.
 * `sky`: a readable sky fibre, which has no object to measure and counts neither as success nor as failure.
 */
export type Outcome = 'accepted' | 'flagged' | 'unreadable' | 'sky';

/**
 * @returns `unreadable` before anything else; a row without a redshift is never `accepted`
 */
export function outcomeOf(row: CatalogueRow): Outcome {
  if (reasonWords(row.reasons).includes('unreadable')) return 'unreadable';
  if (row.role === 'sky') return 'sky';
  return row.needs_review || row.redshift === null ? 'flagged' : 'accepted';
}
