import { execFileSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { DuckDBInstance } from '@duckdb/node-api';
import { parquetMetadata, parquetReadObjects } from 'hyparquet';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { COLUMNS } from '../../../report/catalogue/columns.ts';
import type { Column } from '../../../report/catalogue/columns.ts';
import { catalogueCsv } from '../../../report/catalogue/csv.ts';
import { catalogueFits } from '../../../report/catalogue/fits.ts';
import { catalogueParquet } from '../../../report/catalogue/parquet.ts';
import { catalogueVotable } from '../../../report/catalogue/votable.ts';
import { hasOutsideTool, outputOf, PYTHON } from '../../support/outside-tool.ts';
import { fabricatedRows } from '../fabricated-night.ts';

const FITSVERIFY = '/usr/bin/fitsverify';
const hasAstropy = hasOutsideTool(PYTHON, ['-c', 'import astropy.io.votable.ucd'], 'python3-astropy');

/** FITS columns are cut where they would be absurdly wide; the other formats carry the text whole. */
const FITS_TEXT_LENGTH = 400;

type Value = string | number | boolean | null;
type Row = Readonly<Record<string, Value>>;
type Table = readonly Row[];

const ROWS = fabricatedRows();

/**
 * What a reader must find, written down without the code under test. UTF-8 has no half surrogate pairs.
 *
 * @param emptyIsMissing in CSV, FITS and VOTable an empty text and a missing one look the same
 */
function expected(emptyIsMissing: boolean): Table {
  return ROWS.map((row) =>
    rowOfColumns(({ name, type }) => {
      const value = row[name];
      if (typeof value === 'number' && type === 'float') return Math.fround(value);
      if (typeof value !== 'string') return value;
      return value === '' && emptyIsMissing ? null : value.replace(/\p{Surrogate}/gu, '\ufffd');
    }),
  );
}

function rowOfColumns(valueOf: (column: Column) => Value): Row {
  return Object.fromEntries(COLUMNS.map((column): [string, Value] => [column.name, valueOf(column)]));
}

/** Every `float` read as a decimal, at the width it was written with. */
function atFloatWidth(table: Table): Table {
  const floats = new Set<string>(COLUMNS.filter(({ type }) => type === 'float').map(({ name }) => name));
  return table.map((row) =>
    Object.fromEntries(
      Object.entries(row).map(([name, value]) => [
        name,
        typeof value === 'number' && floats.has(name) ? Math.fround(value) : value,
      ]),
    ),
  );
}

let folder = '';
const path = (name: string): string => join(folder, name);
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'catalogues-'));
  writeFileSync(path('c.csv'), catalogueCsv(ROWS, ['night 1', 'two\nlines']));
  writeFileSync(path('c.fits'), catalogueFits(ROWS, [{ keyword: 'NIGHT', value: '2031-04-02' }]));
  writeFileSync(path('c.parquet'), catalogueParquet(ROWS, { night: '2031-04-02' }));
  writeFileSync(path('c.vot'), catalogueVotable(ROWS, 'night <1> & "co"', { night: '2031-04-02' }));
});
afterAll(() => {
  rmSync(folder, { recursive: true });
});

const CSV_SCRIPT = `
import csv, json, sys
lines = open(sys.argv[1], encoding='utf-8', newline='').read()
head = [line for line in lines.split('\\n') if line.startswith('# ')]
table = lines[sum(len(line) + 1 for line in head):]
print(json.dumps({'head': head, 'rows': list(csv.DictReader(table.splitlines(True)))}))
`;

describe.skipIf(!hasAstropy)('the CSV catalogue read by the csv module of Python', () => {
  it('has the comments, the columns in order and every value', () => {
    const read = JSON.parse(outputOf(PYTHON, ['-c', CSV_SCRIPT, path('c.csv')])) as {
      head: string[];
      rows: Record<string, string>[];
    };
    expect(read.head).toEqual(['# night 1', '# two', '# lines']);
    expect(Object.keys(read.rows[0]!)).toEqual(COLUMNS.map(({ name }) => name));
    const typed = read.rows.map((row) =>
      rowOfColumns(({ name, type }) => {
        const cell = row[name]!;
        if (cell === '') return null;
        if (type === 'boolean') return { true: true, false: false }[cell]!;
        return type === 'word' || type === 'text' ? cell : Number(cell);
      }),
    );
    expect(atFloatWidth(typed)).toEqual(expected(true));
  });
});

const FITS_SCRIPT = `
import json, math, sys, warnings
warnings.simplefilter('error')
from astropy.io import fits
with fits.open(sys.argv[1], checksum=True) as hdus:
    table = hdus['CATALOGUE']
    nulls = {c.name: c.null for c in table.columns}
    def plain(name, value):
        value = value.item() if hasattr(value, 'item') else value
        if isinstance(value, float) and math.isnan(value): return None
        if value == '' or (nulls[name] is not None and value == nulls[name]): return None
        return value
    print(json.dumps({
        'rows': [{c: plain(c, row[c]) for c in table.columns.names} for row in table.data],
        'units': {c.name: c.unit for c in table.columns if c.unit},
        'ucds': {table.header['TTYPE%d' % i]: table.header.get('TUCD%d' % i, '') for i in range(1, len(table.columns) + 1)},
        'night': table.header['NIGHT'],
    }))
`;

/** Undoes the escapes of FITS texts with a decoder that is not ours: they are those of JSON. */
function unescaped(text: string): string {
  return JSON.parse(`"${text.replaceAll('"', '\\"')}"`) as string;
}

describe.skipIf(!hasAstropy)('the FITS catalogue read by astropy', () => {
  it('has every value, unit and UCD, right checksums, and raises no warning', () => {
    const read = JSON.parse(outputOf(PYTHON, ['-c', FITS_SCRIPT, path('c.fits')])) as {
      rows: Table;
      units: Record<string, string>;
      ucds: Record<string, string>;
      night: string;
    };
    const texts = new Set<string>(COLUMNS.filter(({ type }) => type === 'text').map(({ name }) => name));
    const restored = read.rows.map((row) =>
      Object.fromEntries(
        Object.entries(row).map(([name, value]) => [
          name,
          typeof value === 'string' ? unescaped(value).replace(/\p{Surrogate}/gu, '\ufffd') : value,
        ]),
      ),
    );
    const cut = expected(true).map((row) =>
      Object.fromEntries(
        Object.entries(row).map(([name, value]) => [
          name,
          typeof value === 'string' && texts.has(name) && name !== 'input_file'
            ? value.slice(0, FITS_TEXT_LENGTH)
            : value,
        ]),
      ),
    );
    expect(restored).toEqual(cut);
    expect(read.units).toEqual(
      Object.fromEntries(COLUMNS.filter(({ unit }) => unit !== '').map(({ name, unit }) => [name, unit])),
    );
    expect(read.ucds).toEqual(Object.fromEntries(COLUMNS.map(({ name, ucd }) => [name, ucd])));
    expect(read.night).toBe('2031-04-02');
  });
});

describe.skipIf(!hasOutsideTool(FITSVERIFY, ['-h'], 'fitsverify'))(
  'the FITS catalogue checked by fitsverify',
  () => {
    it('has no error and no warning', () => {
      expect(outputOf(FITSVERIFY, [path('c.fits')])).toContain(
        '**** Verification found 0 warning(s) and 0 error(s). ****',
      );
    });
  },
);

const VOTABLE_SCRIPT = `
import json, sys, warnings
warnings.simplefilter('error')
import numpy
from astropy.io import votable
from astropy.io.votable.ucd import parse_ucd
tree = votable.parse(sys.argv[1], verify='exception')
table = tree.get_first_table()
for field in table.fields:
    if field.ucd: parse_ucd(field.ucd, check_controlled_vocabulary=True, has_colon=False)
def plain(value):
    if value is numpy.ma.masked: return None
    value = value.item() if hasattr(value, 'item') else value
    return None if value == '' else value
print(json.dumps({
    'version': tree.version,
    'name': table.name,
    'rows': [{name: plain(table.array[name][i]) for name in table.array.dtype.names} for i in range(len(table.array))],
    'units': {f.name: f.unit.to_string('vounit') for f in table.fields if f.unit is not None},
    'described': all(f.description for f in table.fields),
    'systems': {f.name: f.ref for f in table.fields if f.ref},
}))
`;

describe.skipIf(!hasAstropy)(
  'the VOTable catalogue read by astropy, which refuses what the standard does',
  () => {
    it('is version 1.4 with every value, VOUnits, controlled UCDs and a description of each field', () => {
      const read = JSON.parse(outputOf(PYTHON, ['-c', VOTABLE_SCRIPT, path('c.vot')])) as Record<
        string,
        unknown
      >;
      // XML cannot hold control characters (XML 1.0, section 2.2); this reader drops outer blanks of a cell.
      const inXml = expected(true).map((row) =>
        Object.fromEntries(
          Object.entries(row).map(([name, value]) => [
            name,
            typeof value === 'string' ? value.replaceAll('\u0001', '\ufffd').trim() : value,
          ]),
        ),
      );
      expect(atFloatWidth(read['rows'] as Table)).toEqual(inXml);
      expect(read).toMatchObject({
        version: '1.4',
        name: 'night <1> & "co"',
        units: {
          ra: 'deg',
          dec: 'deg',
          exposure_s: 's',
          magnitude: 'mag',
          velocity_km_s: 'km.s**-1',
          velocity_error_km_s: 'km.s**-1',
          barycentric_correction_km_s: 'km.s**-1',
        },
        described: true,
        systems: { ra: 'icrs', dec: 'icrs', observed_at: 'utc' },
      });
    });
  },
);

describe('the Parquet catalogue', () => {
  it('read by hyparquet has every value, null apart from empty, and the units in its metadata', async () => {
    const bytes = readFileSync(path('c.parquet'));
    const file = bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.length);
    expect(await parquetReadObjects({ file })).toEqual(expected(false));
    const metadata = parquetMetadata(file).key_value_metadata ?? [];
    const values = Object.fromEntries(metadata.map(({ key, value }) => [key, value]));
    expect(values).toMatchObject({
      night: '2031-04-02',
      'unit.velocity_km_s': 'km/s',
      'ucd.redshift': 'src.redshift',
    });
    expect(values['meaning.confidence']).toContain('300 (galaxy), 1500 (quasar) or 100 (star) km/s');
  });

  it('read by DuckDB has the declared types and every value', async () => {
    const connection = await (await DuckDBInstance.create()).connect();
    const types = await connection.runAndReadAll(`describe select * from '${path('c.parquet')}'`);
    const duckType = {
      word: 'VARCHAR',
      text: 'VARCHAR',
      int: 'INTEGER',
      float: 'FLOAT',
      double: 'DOUBLE',
      boolean: 'BOOLEAN',
    };
    expect(types.getRowObjects().map((row) => [row['column_name'], row['column_type']])).toEqual(
      COLUMNS.map(({ name, type }) => [name, duckType[type]]),
    );
    const rows = await connection.runAndReadAll(`select * from '${path('c.parquet')}'`);
    expect(rows.getRowObjects()).toEqual(expected(false));
  });
});

describe.skipIf(!hasAstropy)('the columns', () => {
  it('have units that are valid FITS units and VOUnits (astropy)', () => {
    const units = [...new Set(COLUMNS.map(({ unit }) => unit).filter((unit) => unit !== ''))];
    const script = `
import sys, warnings
warnings.simplefilter('error')
from astropy import units
for text in sys.argv[1:]:
    for form in ('fits', 'vounit'): units.Unit(text, format=form)
`;
    expect(() => execFileSync(PYTHON, ['-c', script, ...units])).not.toThrow();
  });
});
