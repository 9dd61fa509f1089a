import { InputFault } from '../errors.ts';
import { kindOfArray } from './array-kind.ts';
import type { ArrayKind } from './array-kind.ts';
import type { FitsFile, TableHdu } from './fits/model.ts';
import { fluxPerOf } from './flux-unit.ts';
import type { SpreadMeaning } from './layout.ts';
import { lineSpreadMeaningOf } from './line-spread-meaning.ts';
import { statedMedium } from './medium.ts';
import { columnArray } from './recognition.ts';
import type { Recognition } from './recognition.ts';
import { spreadMeaningByNumbers } from './spread-meaning.ts';
import { flagPolarity, looksLikeFlag } from './text/flag-column.ts';
import { isMonotonic, wavelengthUnitByNumbers } from './wavelength/wavelength-numbers.ts';
import { wavelengthUnitOfArray } from './wavelength/wavelength-unit-of-array.ts';

/** Reasons a column was given its part: by its name, or by its numbers. */
type Found = Map<ArrayKind, number>;

/**
 * Recognise one spectrum in a text in columns: by the names of the columns where they have any that tell, else by
 * the numbers: the first that runs one way over optical wavelengths, the first other one as flux, one that explains
 * its scatter as error, whole numbers as flag.
 *
 * Optical text files without a word about the medium are read as air. Evidence: over 303 such spectra of one survey
 * the scatter from spectrum to spectrum peaks at air positions of the night-sky lines to 0.4 Å on average (0.2, -0.8,
 * 1.5 and 0.5 Å in four regions between 4,500 and 9,300 Å), and misses vacuum positions by 1.8 Å.
 *
 * @param file a text as a file with one table
 * @throws InputFault `layout-unknown` without a wavelength or a flux
 */
export function recogniseText(file: FitsFile): Recognition {
  const table = file.hdus[0] as TableHdu;
  const read = (index: number): Float64Array => table.readNumbers(index, 0, table.rowCount);
  const name = (index: number): string => table.columns[index]!.name;
  const found: Found = new Map();
  const recognised: string[] = [];
  table.columns.forEach((column, index) => {
    const kind = kindOfArray(column.name, column.ucd);
    if (kind !== null && !found.has(kind)) found.set(kind, index);
  });
  const namesTell = found.has('flux') && found.has('wavelength');
  let spreadMeaning: SpreadMeaning = 'none';
  if (namesTell) {
    for (const kind of ['inverse-variance', 'error', 'variance'] as const) {
      if (spreadMeaning === 'none' && found.has(kind)) spreadMeaning = kind;
    }
  } else {
    spreadMeaning = assignByNumbers(table, found);
  }
  const by = namesTell ? 'by their names' : 'by their numbers';
  const wave = found.get('wavelength');
  const flux = found.get('flux');
  if (wave === undefined || flux === undefined) {
    const detail = `two of ${table.columns.length} columns must be a wavelength and a flux, got neither by name nor by numbers`;
    throw new InputFault('layout-unknown', { file: file.label }, detail);
  }
  const place = { file: file.label };
  const unit = wavelengthUnitOfArray(name(wave), table.columns[wave]!.unit, read(wave), place);
  recognised.push(`text in ${table.columns.length} columns, ${table.rowCount} pixels; columns told ${by}`);
  recognised.push(`wavelength from '${name(wave)}', flux from '${name(flux)}'`);

  const missing: string[] = [];
  const spread = spreadMeaning === 'none' ? undefined : found.get(spreadMeaning);
  if (spread === undefined) missing.push('no error column: noise will be estimated');
  else recognised.push(`${spreadMeaning} from '${name(spread)}'`);
  const flag = found.get('quality') ?? found.get('good');
  const polarity = flag === undefined ? null : flagPolarity(read(flag), read(flux));
  if (flag !== undefined && polarity !== null) {
    const bad = polarity.badWhen === 'zero' ? '0' : 'not 0';
    recognised.push(`flag from '${name(flag)}', bad where ${bad} (${polarity.because})`);
  }
  const sky = found.get('sky');
  const lineSpread = found.get('line-spread');
  const meaning =
    lineSpread === undefined
      ? null
      : lineSpreadMeaningOf(name(lineSpread), table.columns[lineSpread]!.unit, read(lineSpread));
  const stated = statedMedium([table.header], [name(wave), table.columns[wave]!.unit]);
  if (stated !== null) recognised.push(`wavelengths in ${stated.medium}, says ${stated.because}`);
  else
    missing.push(
      'vacuum or air is not stated: air assumed, as is usual in text files (set `medium` in a profile to change it)',
    );
  const column = (index: number) => columnArray(0, name(index));
  return {
    form: 'text',
    arms: [
      {
        name: '',
        wavelength: column(wave),
        wavelengthMeaning: unit.meaning,
        wavelengthUnitAngstrom: unit.angstrom,
        medium: stated?.medium ?? 'air',
        flux: column(flux),
        fluxPer: fluxPerOf(table.columns[flux]!.unit),
        spread: spread === undefined ? null : column(spread),
        spreadMeaning,
        quality: flag === undefined ? [] : [column(flag)],
        qualityBadWhen: polarity?.badWhen ?? 'nonzero',
        sky: sky === undefined ? null : column(sky),
        lineSpread: lineSpread === undefined || meaning === null ? null : column(lineSpread),
        lineSpreadMeaning: meaning ?? 'sigma-pixel',
      },
    ],
    rowCount: 1,
    recognised,
    missing,
  };
}

/** Fill `found` from the numbers; returns what the spread column means. */
function assignByNumbers(table: TableHdu, found: Found): SpreadMeaning {
  found.clear();
  const columns = table.columns.map((_, index) => table.readNumbers(index, 0, table.rowCount));
  const wave = columns.findIndex((values) => {
    if (!isMonotonic(values)) return false;
    const ends = [values[0]!, values[values.length - 1]!];
    return wavelengthUnitByNumbers(Math.min(...ends), Math.max(...ends)) !== null;
  });
  if (wave < 0) return 'none';
  found.set('wavelength', wave);
  const others = columns.map((_, index) => index).filter((index) => index !== wave);
  const flags = others.filter((index) => looksLikeFlag(columns[index]!));
  const values = others.filter((index) => !flags.includes(index));
  const flux = values[0];
  if (flux === undefined) return 'none';
  found.set('flux', flux);
  const flag = flags[0];
  if (flag !== undefined) found.set('quality', flag);
  const best = values
    .slice(1)
    .map((index) => ({ index, reading: spreadMeaningByNumbers(columns[flux]!, columns[index]!) }))
    .filter(({ reading }) => reading !== null)
    .sort((a, b) => a.reading!.mismatch - b.reading!.mismatch)[0];
  if (best === undefined) return 'none';
  const { meaning } = best.reading!;
  found.set(meaning as ArrayKind, best.index);
  return meaning;
}
