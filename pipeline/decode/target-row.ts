import type { FitsFile, TableHdu } from './fits/model.ts';
import type { Layout } from './layout.ts';
import type { Role } from './spectrum.ts';

/** What a table says of one spectrum; null where it does not say. */
export interface TargetRow {
  readonly name: string | null;
  readonly raDeg: number | null;
  readonly decDeg: number | null;
  readonly fibre: number | null;
  readonly role: Role | null;
  readonly targetClass: string | null;
  readonly magnitude: number | null;
  readonly magnitudeBand: string | null;
}

const NOTHING: TargetRow = {
  name: null,
  raDeg: null,
  decDeg: null,
  fibre: null,
  role: null,
  targetClass: null,
  magnitude: null,
  magnitudeBand: null,
};

/**
 * Read the row of the targets table that belongs to a spectrum.
 *
 * @param row 0-based
 */
export function targetRowOf(file: FitsFile, layout: Layout, row: number): TargetRow {
  const { targetsHdu, targetColumns: columns } = layout;
  if (targetsHdu === null || columns === undefined) return NOTHING;
  const table = file.hdus.find((hdu): hdu is TableHdu => hdu.index === targetsHdu && hdu.type === 'table');
  if (table === undefined || row >= table.rowCount) return NOTHING;
  const text = (name: string | null): string | null => textOf(table, name, row);
  const number = (name: string | null): number | null => {
    const value = name === null ? null : text(name);
    return value === null || !Number.isFinite(Number(value)) ? null : Number(value);
  };
  const role = text(columns.role);
  const fibre = number(columns.fibre);
  return {
    name: text(columns.name),
    raDeg: inRange(number(columns.ra), 0, 360),
    decDeg: inRange(number(columns.dec), -90, 90),
    fibre: fibre !== null && Number.isInteger(fibre) ? fibre : null,
    role: role === null ? null : roleOf(role),
    targetClass: text(columns.targetClass),
    magnitude: inRange(number(columns.magnitude), -30, 40),
    magnitudeBand: text(columns.magnitudeBand) ?? bandOfName(columns.magnitude),
  };
}

/**
 * What a fibre was pointed at, from a survey's own word for it.
 *
 * @param word e.g. `sky`, `TARGET`, `calibration star`
 */
export function roleOf(word: string): Role {
  if (/sky/i.test(word)) return 'sky';
  return /cal|standard|\bstd\b|flat|\barc\b|lamp/i.test(word) ? 'calibration' : 'target';
}

function textOf(table: TableHdu, name: string | null, row: number): string | null {
  if (name === null) return null;
  const index = table.columns.findIndex((column) => column.name === name);
  if (index < 0) return null;
  // Identifiers beyond 2^53 are exact only as integers; text keeps them so.
  const value = /^[BIJK]$/.test(table.columns[index]!.code)
    ? (table.readIntegers(index, row, 1)[0]?.toString() ?? '')
    : (table.readStrings(index, row, 1)[0] ?? '');
  return value.trim() === '' ? null : value.trim();
}

/** `mag_r` and `r_mag` name their band. */
function bandOfName(name: string | null): string | null {
  return (
    /^(?:mag_([a-z])|([ugrizy])_?mag)$/i
      .exec(name ?? '')
      ?.slice(1)
      .find(Boolean) ?? null
  );
}

function inRange(value: number | null, low: number, high: number): number | null {
  return value !== null && value >= low && value <= high ? value : null;
}
