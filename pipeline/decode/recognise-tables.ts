import { InputFault } from '../errors.ts';
import { armOfName, kindOfArray, plainName } from './array-kind.ts';
import type { ArrayKind } from './array-kind.ts';
import { chooseMedium } from './choose-medium.ts';
import type { FitsFile, TableColumn, TableHdu } from './fits/model.ts';
import { fluxPerOf } from './flux-unit.ts';
import type { ArmLayout, SpreadMeaning } from './layout.ts';
import { lineSpreadMeaningOf } from './line-spread-meaning.ts';
import { columnArray } from './recognition.ts';
import type { Recognition } from './recognition.ts';
import { isMonotonic } from './wavelength/wavelength-numbers.ts';
import { wavelengthUnitOfArray } from './wavelength/wavelength-unit-of-array.ts';

/** A table with fewer rows cannot hold a spectrum with a row per pixel. */
const FEWEST_PIXEL_ROWS = 10;
const NUMERIC = /^[BIJKED]$/;

interface KnownColumn {
  readonly column: TableColumn;
  readonly index: number;
  readonly kind: ArrayKind;
  readonly arm: string;
}

type TableForm = 'table-row-per-pixel' | 'table-row-per-spectrum';

interface TableReading {
  readonly table: TableHdu;
  readonly form: TableForm;
  readonly arms: readonly (readonly KnownColumn[])[];
}

/**
 * Recognise spectra in binary tables: a row per pixel (scalar columns), or a row per spectrum (vector or
 * variable-length cells). Of several tables with the same columns the first is read: co-adds come before
 * the exposures they are made of (common practice, no source).
 *
 * @returns null when no table has a flux with a wavelength
 * @throws InputFault `layout-ambiguous` when tables with different columns could be the spectrum
 */
export function recogniseTables(file: FitsFile): Recognition | null {
  const readings = file.hdus
    .filter((hdu): hdu is TableHdu => hdu.type === 'table' && hdu.rowCount > 0)
    .map(readTable)
    .filter((reading) => reading !== null);
  const first = readings[0];
  if (first === undefined) return null;
  const columnsOf = ({ table }: TableReading): string =>
    table.columns.map(({ name }) => plainName(name)).join(' ');
  const recognised: string[] = [];
  if (readings.length > 1) {
    const list = readings.map(({ table }) => `HDU ${table.index} '${table.name}'`).join(', ');
    if (readings.some((reading) => columnsOf(reading) !== columnsOf(first))) {
      throw new InputFault(
        'layout-ambiguous',
        { file: file.label },
        `one table must hold the spectra, got ${list}`,
      );
    }
    recognised.push(`${list} have the same columns: the first is read`);
  }
  const missing: string[] = [];
  const arms = first.arms.map((columns) => armOfColumns(file, first, columns, recognised, missing));
  const { table } = first;
  const rowCount = first.form === 'table-row-per-pixel' ? 1 : table.rowCount;
  const shape = first.form === 'table-row-per-pixel' ? 'a row per pixel' : 'a row per spectrum';
  recognised.unshift(`table in HDU ${table.index} with ${shape}, ${table.rowCount} rows`);
  return { form: first.form, arms, rowCount, recognised, missing };
}

function readTable(table: TableHdu): TableReading | null {
  const known = table.columns.flatMap((column, index): KnownColumn[] => {
    const kind = kindOfArray(column.name, column.ucd);
    return kind === null ? [] : [{ column, index, kind, arm: armOfName(column.name) }];
  });
  const scalars = known.filter(({ column }) => NUMERIC.test(column.code) && column.repeat === 1);
  if (table.rowCount >= FEWEST_PIXEL_ROWS) {
    const arm = pickArm(scalars, (wave) => isMonotonic(table.readNumbers(wave.index, 0, table.rowCount)));
    if (arm !== null) return { table, form: 'table-row-per-pixel', arms: [arm] };
  }
  const vectors = known.filter(
    ({ column }) => /^[PQ]$/.test(column.code) || (NUMERIC.test(column.code) && column.repeat > 1),
  );
  const armNames = [...new Set(vectors.filter(({ kind }) => kind === 'flux').map(({ arm }) => arm))];
  const arms = armNames
    .map((name) => pickArm(vectors.filter(({ arm, kind }) => arm === name || kind === 'wavelength')))
    .filter((arm) => arm !== null);
  return arms.length === 0 ? null : { table, form: 'table-row-per-spectrum', arms };
}

/** The columns of one spectrum among candidates: one of each kind, the plainest name; all masks. */
function pickArm(
  candidates: readonly KnownColumn[],
  isAxis: (wave: KnownColumn) => boolean = () => true,
): readonly KnownColumn[] | null {
  const plainest = (kind: ArrayKind, arm: string | null): KnownColumn | undefined =>
    candidates
      .filter((candidate) => candidate.kind === kind && (arm === null || candidate.arm === arm))
      .sort((a, b) => a.column.name.length - b.column.name.length)[0];
  const flux = plainest('flux', null);
  if (flux === undefined) return null;
  // With one flux its companions need not share its word (`spectrum` beside `error`, or names told by UCD alone).
  const isOnly = candidates.every(({ kind, arm }) => kind !== 'flux' || arm === flux.arm);
  const companion = (kind: ArrayKind): KnownColumn | undefined =>
    plainest(kind, flux.arm) ?? (isOnly ? plainest(kind, null) : undefined);
  const wave = companion('wavelength') ?? plainest('wavelength', null);
  if (wave === undefined || !isAxis(wave)) return null;
  const spread = companion('inverse-variance') ?? companion('error') ?? companion('variance');
  const rest = candidates.filter(({ kind }) => kind === 'quality');
  const goods = rest.length > 0 ? [] : candidates.filter(({ kind }) => kind === 'good');
  const once = [wave, spread, companion('sky'), companion('line-spread')];
  return [flux, ...once.filter((column) => column !== undefined), ...rest, ...goods];
}

function armOfColumns(
  file: FitsFile,
  { table, form }: TableReading,
  columns: readonly KnownColumn[],
  recognised: string[],
  missing: string[],
): ArmLayout {
  const ofKind = (...kinds: ArrayKind[]): KnownColumn[] => columns.filter(({ kind }) => kinds.includes(kind));
  const sample = ({ index }: KnownColumn): Float64Array =>
    form === 'table-row-per-pixel' ? table.readNumbers(index, 0, table.rowCount) : table.readCell(index, 0);
  const source = ({ column }: KnownColumn) => columnArray(table.index, column.name);
  const flux = ofKind('flux')[0]!;
  const wave = ofKind('wavelength')[0]!;
  const spread = ofKind('inverse-variance', 'error', 'variance')[0];
  const masks = ofKind('quality', 'good');
  const sky = ofKind('sky')[0];
  const lineSpread = ofKind('line-spread')[0];
  const place = { file: file.label, hdu: table.index };
  const unit = wavelengthUnitOfArray(wave.column.name, wave.column.unit, sample(wave), place);
  const medium = chooseMedium(file, table.index, [wave.column.name, wave.column.unit, wave.column.ucd], null);
  const meaning =
    lineSpread === undefined
      ? null
      : lineSpreadMeaningOf(lineSpread.column.name, lineSpread.column.unit, sample(lineSpread));

  const scale = unit.meaning === 'linear' ? `${unit.angstrom} Å per unit` : `${unit.meaning} of ångström`;
  recognised.push(`flux from '${flux.column.name}', wavelength from '${wave.column.name}' (${scale})`);
  if (spread === undefined) missing.push('no error column: noise will be estimated');
  else recognised.push(`${spread.kind} from '${spread.column.name}'`);
  for (const mask of masks) recognised.push(`mask from '${mask.column.name}'`);
  if (sky !== undefined) recognised.push(`sky from '${sky.column.name}'`);
  if (lineSpread !== undefined && meaning !== null) {
    recognised.push(`line spread from '${lineSpread.column.name}', read as ${meaning}`);
  } else missing.push('no line spread that could be understood');
  recognised.push(...medium.recognised);
  missing.push(...medium.missing);
  return {
    name: flux.arm,
    wavelength: source(wave),
    wavelengthMeaning: unit.meaning,
    wavelengthUnitAngstrom: unit.angstrom,
    medium: medium.medium,
    flux: source(flux),
    fluxPer: fluxPerOf(flux.column.unit),
    spread: spread === undefined ? null : source(spread),
    spreadMeaning: (spread?.kind ?? 'none') as SpreadMeaning,
    quality: masks.map(source),
    qualityBadWhen: masks.some(({ kind }) => kind === 'good') ? 'zero' : 'nonzero',
    sky: sky === undefined ? null : source(sky),
    lineSpread: lineSpread === undefined || meaning === null ? null : source(lineSpread),
    lineSpreadMeaning: meaning ?? 'sigma-pixel',
  };
}
