import type { FitsFile, Header, TableColumn, TableHdu } from '../fits/model.ts';
import type { TextTable } from './parse-text.ts';

/**
 * A parsed text in the shape of a file with one table, so that one reader serves both. `key: value` comments
 * become cards, with numbers and logicals (`T`, `true`) told from text.
 *
 * @param label what messages call the file
 */
export function textAsFile(label: string, table: TextTable): FitsFile {
  return { label, hdus: [tableOf(table)], fault: null, trailingBytes: 0 };
}

function tableOf({ names, units, columns, comments, cards }: TextTable): TableHdu {
  const rowCount = columns[0]!.length;
  const described = columns.map(
    (_, i): TableColumn => ({
      name: names[i] === '' || names[i] === undefined ? `column ${i + 1}` : names[i],
      unit: units[i] ?? '',
      ucd: '',
      code: 'D',
      repeat: 1,
      shape: [1],
    }),
  );
  const read = (column: number, first: number, count: number): Float64Array => {
    const values = columns[column];
    if (values === undefined || first < 0 || count < 0 || first + count > rowCount) {
      throw new RangeError(`rows ${first}..${first + count} of column ${column} must be in the text`);
    }
    return values.slice(first, first + count);
  };
  const each =
    <T>(turn: (value: number) => T) =>
    (column: number, first: number, count: number): T[] =>
      Array.from(read(column, first, count), turn);
  return {
    type: 'table',
    index: 0,
    name: '',
    header: headerOf(cards, comments),
    rowCount,
    columns: described,
    readNumbers: read,
    readIntegers: each((value) => (Number.isInteger(value) ? BigInt(value) : null)),
    readStrings: each((value) => (Number.isNaN(value) ? '' : String(value))),
    readLogicals: each((value) => (Number.isNaN(value) ? null : value !== 0)),
    readBits: each((value) => (value === 0 ? '0' : '1')),
    readCell: (column, row) => read(column, row, 1),
  };
}

function headerOf(cards: readonly (readonly [string, string])[], comments: readonly string[]): Header {
  const values = new Map<string, string | number | boolean>();
  for (const [key, text] of cards) {
    const keyword = key.trim().toUpperCase();
    if (!values.has(keyword)) values.set(keyword, cardValue(text));
  }
  return { get: (keyword) => values.get(keyword), keys: () => [...values.keys()], comments };
}

function cardValue(text: string): string | number | boolean {
  const bare = text.replace(/^(['"])(.*)\1$/, '$2');
  if (/^(t|true)$/i.test(bare)) return true;
  if (/^(f|false)$/i.test(bare)) return false;
  return bare !== '' && Number.isFinite(Number(bare)) ? Number(bare) : bare;
}
