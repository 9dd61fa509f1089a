import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { encodeFits } from '../../../pipeline/encode/index.ts';
import { hasOutsideTool, outputOf, PYTHON } from '../../support/outside-tool.ts';

const hasAstropy = hasOutsideTool(PYTHON, ['-c', 'import astropy.io.fits'], 'python3-astropy');
const FITSVERIFY = '/usr/bin/fitsverify';

/** No quote before a blank: astropy 5.2.1 misreads that in CONTINUE cards, its own ones too. */
const LONG = "it's a long text & more ".repeat(8).trim();

const FILE = encodeFits([
  {
    type: 'image',
    axes: [3, 2],
    pixels: new Float32Array([0.1, 2, 3, 4, NaN, -6e30]),
    unit: 'erg/s/cm2/Angstrom',
    cards: [
      { keyword: 'LONG', value: LONG, comment: 'continued' },
      { keyword: 'TINY', value: -1.2345678901234567e-300 },
      { keyword: 'BIG', value: 9007199254740993n },
      { keyword: 'YES', value: true },
      { keyword: 'HISTORY', text: 'h'.repeat(100) },
    ],
  },
  { type: 'image', name: 'BYTES', axes: [4], pixels: Uint8Array.of(0, 127, 128, 255) },
  { type: 'image', name: 'SHORTS', axes: [2], pixels: Int16Array.of(-32768, 32767) },
  { type: 'image', name: 'WORDS', axes: [2], pixels: Int32Array.of(-2147483648, 2147483647) },
  { type: 'image', name: 'DOUBLES', axes: [2], pixels: Float64Array.of(Math.PI, 1e-300) },
  {
    type: 'table',
    name: 'ROWS',
    rowCount: 3,
    columns: [
      { name: 'ok', type: 'logical', values: [true, false, null] },
      {
        name: 'count',
        type: 'int32',
        values: [7, null, -1],
        unit: 'pix',
        ucd: 'meta.number',
        description: 'how many',
      },
      { name: 'id', type: 'int64', values: [9007199254740993n, -5n, null] },
      { name: 'single', type: 'float32', values: [0.1, null, 3] },
      { name: 'double', type: 'float64', values: [0.1, null, 1e300], unit: 'km/s', display: 'F12.4' },
      { name: 'vector', type: 'float32', values: [1, 2, 3, 4, 5, 6], repeat: 2 },
      { name: 'label', type: 'string', values: ['abc', null, "d'e"], length: 8 },
    ],
  },
]);

/** What astropy sees in the file, as JSON; NaN as null and 64-bit integers as text. */
const SCRIPT = `
import json, sys, warnings
import numpy as np
from astropy.io import fits
warnings.simplefilter('error')
def plain(v):
    return [plain(x) for x in v] if isinstance(v, (list, np.ndarray)) else v
def numbers(a):
    return [None if np.isnan(x) else float(x) for x in np.asarray(a, dtype='f8').ravel()]
with fits.open(sys.argv[1], checksum=True) as h:
    h.verify('exception')
    t = h['ROWS'].data
    head = h[0].header
    print(json.dumps({
        'cards': [head['LONG'], head['TINY'], str(head['BIG']), head['YES'], head['BUNIT'], ''.join(head['HISTORY'])],
        'images': [numbers(x.data) for x in h[:5]],
        'dtypes': [x.data.dtype.str[1:] for x in h[:5]],
        'ok': [bool(x) for x in t['ok']],
        'count': t['count'].tolist(),
        'id': [str(x) for x in t['id']],
        'single': numbers(t['single']),
        'double': numbers(t['double']),
        'vector': t['vector'].tolist(),
        'label': [str(x) for x in t['label']],
        'column': [h['ROWS'].header[k] for k in ('TNULL2', 'TUNIT2', 'TUCD2', 'TCOMM2', 'TDISP5')],
    }))
`;

let folder = '';
let path = '';
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'encode-fits-'));
  path = join(folder, 'written.fits');
  writeFileSync(path, FILE);
});
afterAll(() => {
  rmSync(folder, { recursive: true });
});

describe.skipIf(!hasAstropy)('a written file read by astropy', () => {
  it('has the same cards, pixels and cells, right checksums, and raises no warning', () => {
    expect(JSON.parse(outputOf(PYTHON, ['-c', SCRIPT, path]))).toEqual({
      cards: [
        LONG,
        -1.2345678901234567e-300,
        '9007199254740993',
        true,
        'erg/s/cm2/Angstrom',
        'h'.repeat(100),
      ],
      images: [
        [0.1, 2, 3, 4, NaN, -6e30].map((value) => (Number.isNaN(value) ? null : Math.fround(value))),
        [0, 127, 128, 255],
        [-32768, 32767],
        [-2147483648, 2147483647],
        [Math.PI, 1e-300],
      ],
      dtypes: ['f4', 'u1', 'i2', 'i4', 'f8'],
      ok: [true, false, false],
      count: [7, -2147483648, -1],
      id: ['9007199254740993', '-5', '-9223372036854775808'],
      single: [Math.fround(0.1), null, 3],
      double: [0.1, null, 1e300],
      vector: [
        [1, 2],
        [3, 4],
        [5, 6],
      ],
      label: ['abc', '', "d'e"],
      column: [-2147483648, 'pix', 'meta.number', 'how many', 'F12.4'],
    });
  });
});

describe.skipIf(!hasOutsideTool(FITSVERIFY, ['-h'], 'fitsverify'))(
  'a written file checked by fitsverify',
  () => {
    it('has no error and no warning', () => {
      expect(outputOf(FITSVERIFY, [path])).toContain(
        '**** Verification found 0 warning(s) and 0 error(s). ****',
      );
    });
  },
);
