import { parquetWriteBuffer } from 'hyparquet-writer';
import type { BasicType } from 'hyparquet-writer';
import type { CatalogueRow } from '../../store/catalogue-row.ts';
import { cellOf } from './cell.ts';
import { COLUMNS } from './columns.ts';
import type { ColumnType } from './columns.ts';

const PARQUET_TYPE: Readonly<Record<ColumnType, BasicType>> = {
  word: 'STRING',
  text: 'STRING',
  int: 'INT32',
  float: 'FLOAT',
  double: 'DOUBLE',
  boolean: 'BOOLEAN',
};

/**
 * The catalogue as Apache Parquet, Snappy-compressed; missing = null. Parquet has no place for units, so the
 * key-value metadata carries `unit.NAME`, `ucd.NAME` and `meaning.NAME` for each column NAME, besides `facts`.
 *
 * @param facts further key-value metadata: night, recipe and the like
 */
export function catalogueParquet(
  rows: readonly CatalogueRow[],
  facts: Readonly<Record<string, string>> = {},
): Uint8Array {
  const kvMetadata = Object.entries(facts).map(([key, value]) => ({ key, value }));
  for (const column of COLUMNS) {
    if (column.unit !== '') kvMetadata.push({ key: `unit.${column.name}`, value: column.unit });
    if (column.ucd !== '') kvMetadata.push({ key: `ucd.${column.name}`, value: column.ucd });
    kvMetadata.push({ key: `meaning.${column.name}`, value: column.meaning });
  }
  const buffer = parquetWriteBuffer({
    createdBy: 'shiftwork',
    kvMetadata,
    columnData: COLUMNS.map((column) => ({
      name: column.name,
      type: PARQUET_TYPE[column.type],
      nullable: true,
      data: rows.map((row) => cellOf(row, column)),
    })),
  });
  return new Uint8Array(buffer);
}
