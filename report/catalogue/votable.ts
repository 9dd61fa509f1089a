import type { CatalogueRow } from '../../store/catalogue-row.ts';
import { cellOf } from './cell.ts';
import { COLUMNS } from './columns.ts';
import type { Column, ColumnType } from './columns.ts';
import { shortestDecimal } from './shortest-decimal.ts';

/** `char` holds ASCII only, so whatever comes from outside is `unicodeChar` (VOTable 1.4, 2.1). */
const DATATYPE: Readonly<Record<ColumnType, string>> = {
  word: 'datatype="char" arraysize="*"',
  text: 'datatype="unicodeChar" arraysize="*"',
  int: 'datatype="int"',
  float: 'datatype="float"',
  double: 'datatype="double"',
  boolean: 'datatype="boolean"',
};

/** Columns that point at the coordinate or time system they are given in. */
const SYSTEM_OF: Readonly<Partial<Record<Column['name'], string>>> = {
  ra: 'icrs',
  dec: 'icrs',
  observed_at: 'utc',
};

/**
 * The catalogue as VOTable 1.4 (IVOA Recommendation, 2019) with TABLEDATA. Missing = empty TD (1.4, section 6).
 *
 * @param name name of the table
 * @param params facts of the night, written as PARAM elements
 */
export function catalogueVotable(
  rows: readonly CatalogueRow[],
  name: string,
  params: Readonly<Record<string, string>> = {},
): string {
  const lines = [
    '<?xml version="1.0" encoding="UTF-8"?>',
    // The namespace of the whole 1.3+ line stays v1.3; only the attribute says 1.4.
    '<VOTABLE version="1.4" xmlns="http://www.ivoa.net/xml/VOTable/v1.3">',
    ' <RESOURCE type="results">',
    '  <COOSYS ID="icrs" system="ICRS"/>',
    '  <TIMESYS ID="utc" timescale="UTC" refposition="TOPOCENTER"/>',
    `  <TABLE ID="catalogue" name="${xml(name)}" nrows="${rows.length}">`,
  ];
  for (const [key, value] of Object.entries(params)) {
    lines.push(`   <PARAM name="${xml(key)}" datatype="unicodeChar" arraysize="*" value="${xml(value)}"/>`);
  }
  for (const column of COLUMNS) lines.push(field(column));
  lines.push('   <DATA><TABLEDATA>');
  for (const row of rows) {
    lines.push(`    <TR>${COLUMNS.map((column) => cellElement(row, column)).join('')}</TR>`);
  }
  lines.push('   </TABLEDATA></DATA>', '  </TABLE>', ' </RESOURCE>', '</VOTABLE>', '');
  return lines.join('\n');
}

function field(column: Column): string {
  const system = SYSTEM_OF[column.name];
  const attributes = [
    `name="${column.name}"`,
    DATATYPE[column.type],
    column.ucd === '' ? '' : `ucd="${column.ucd}"`,
    column.unit === '' ? '' : `unit="${column.unit}"`,
    column.isTime ? 'xtype="timestamp"' : '',
    system === undefined ? '' : `ref="${system}"`,
  ].filter((attribute) => attribute !== '');
  return `   <FIELD ${attributes.join(' ')}><DESCRIPTION>${xml(column.meaning)}</DESCRIPTION></FIELD>`;
}

function cellElement(row: CatalogueRow, column: Column): string {
  const cell = cellOf(row, column);
  if (cell === null || cell === '') return '<TD/>';
  if (typeof cell === 'number') return `<TD>${shortestDecimal(cell, column.type)}</TD>`;
  return `<TD>${typeof cell === 'boolean' ? String(cell) : xml(cell)}</TD>`;
}

/** Everything outside the Char production of XML 1.0 (fifth edition, section 2.2), lone surrogates included. */
const NOT_XML = /[^\t\n\r\u{20}-\u{D7FF}\u{E000}-\u{FFFD}\u{10000}-\u{10FFFF}]/gu;

/** Escapes text for content and attributes; line breaks and tabs as references, or parsers would change them. */
function xml(text: string): string {
  return text
    .replace(NOT_XML, '\u{FFFD}')
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    .replace(/[\t\n\r]/g, (control) => `&#${control.charCodeAt(0)};`);
}
