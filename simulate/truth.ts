import type { Kind } from '../templates/family.ts';
import type { NightExposure } from './night.ts';

/** What one simulated spectrum is, kept apart from the files that are measured. */
export interface SimulatedTruth {
  /** Night folder / file. */
  readonly file: string;
  /** Image row, from 0. */
  readonly row: number;
  /** Target name. */
  readonly select: string;
  /** `none`: no object, or no light of it. */
  readonly kind: Kind | 'none';
  /** Barycentric; null for `none`. */
  readonly redshift: number | null;
  /** The survey's class, or the role of a fibre that has none. */
  readonly group: string;
  readonly magnitude: number | null;
  readonly mishap: string;
}

/** Truth of every row of an exposure; none for a file that broke off, since most of it is not there. */
export function truthOf({ night, file, exposure, keep }: NightExposure): SimulatedTruth[] {
  if (keep < 1) return [];
  return exposure.field.aims.map((aim, row) => {
    const mishap = exposure.mishaps.get(aim.fibre);
    const source = mishap === 'dead' ? null : aim.source;
    return {
      file: `${night}/${file}`,
      row,
      select: aim.targetName,
      kind: source?.kind ?? 'none',
      redshift: source?.redshift ?? null,
      group: mishap ?? (aim.targetClass === '' ? aim.role : aim.targetClass),
      magnitude: aim.source?.magnitude ?? null,
      mishap: mishap ?? '',
    };
  });
}

const COLUMNS = [
  'file',
  'row',
  'select',
  'kind',
  'redshift',
  'reference_trust',
  'group',
  'magnitude',
] as const;

/** The truth table as CSV, shortest round-trip numbers, empty = missing. */
export function truthCsv(rows: readonly SimulatedTruth[]): string {
  const lines = rows.map((row) =>
    [
      row.file,
      row.row,
      row.select,
      row.kind,
      row.redshift ?? '',
      'sure',
      row.group,
      row.magnitude ?? '',
    ].join(','),
  );
  return [COLUMNS.join(','), ...lines, ''].join('\n');
}
