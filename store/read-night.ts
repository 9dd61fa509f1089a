import type { Store } from './contract.ts';
import type { NightReader } from './night-reader.ts';

/**
 * Takes a snapshot of a night for the report: rows and details as they are now. Curves stay packed until a
 * page asks for them (a night of 20,000 flagged spectra would else need gigabytes).
 *
 * @throws RangeError when the store has no such night
 */
export async function nightReader(store: Store, night: string): Promise<NightReader> {
  const facts = await store.facts(night);
  const rows = await store.rows(night);
  const details = await store.details(night);
  return {
    facts: () => facts,
    rows: () => rows,
    detail: (spectrumId) => {
      const detail = details.get(spectrumId);
      if (detail === undefined) {
        throw new RangeError(`spectrum must be one of ${night} with a row, got ${spectrumId}`);
      }
      return detail();
    },
  };
}
