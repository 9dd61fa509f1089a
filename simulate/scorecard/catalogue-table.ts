import { KINDS, type Kind } from '../../templates/family.ts';
import { numberIn, readCsv } from './csv-table.ts';

/** What a scorecard needs of a catalogue row. */
export interface ScoredRow {
  readonly spectrumId: string;
  readonly inputFile: string;
  readonly inputRow: number | null;
  readonly targetName: string;
  readonly kind: Kind | null;
  readonly redshift: number | null;
  readonly redshiftError: number | null;
  readonly confidence: number | null;
  readonly needsReview: boolean;
  /** Median, per ångström. */
  readonly signalToNoise: number | null;
}

/**
 * Reads a catalogue written as CSV.
 *
 * @throws RangeError when a column is missing
 */
export function readCatalogue(text: string): ScoredRow[] {
  return readCsv(text).map((row) => {
    const cell = (column: string): string => {
      const value = row.get(column);
      if (value === undefined) throw new RangeError(`a catalogue must have a column ${column}, got none`);
      return value;
    };
    return {
      spectrumId: cell('spectrum_id'),
      inputFile: cell('input_file'),
      inputRow: numberIn(row, 'input_row'),
      targetName: cell('target_name'),
      kind: KINDS.find((kind) => kind === cell('kind')) ?? null,
      redshift: numberIn(row, 'redshift'),
      redshiftError: numberIn(row, 'redshift_error'),
      confidence: numberIn(row, 'confidence'),
      needsReview: cell('needs_review') === 'true',
      signalToNoise: numberIn(row, 'signal_to_noise_per_angstrom'),
    };
  });
}
