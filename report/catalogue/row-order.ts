import type { CatalogueRow } from '../../store/catalogue-row.ts';

/** Rows in catalogue order: by spectrum_id, in UTF-16 code units, so that no locale can reorder a catalogue. */
export function inCatalogueOrder(rows: readonly CatalogueRow[]): readonly CatalogueRow[] {
  return rows.toSorted((a, b) =>
    a.spectrum_id < b.spectrum_id ? -1 : a.spectrum_id > b.spectrum_id ? 1 : 0,
  );
}
