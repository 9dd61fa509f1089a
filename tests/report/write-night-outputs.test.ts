import { execFileSync } from 'node:child_process';
import { mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { writeNightOutputs } from '../../report/index.ts';
import { fabricatedRows, readerOf } from './fabricated-night.ts';

const NAMES = [
  'catalogue.csv',
  'catalogue.fits',
  'catalogue.parquet',
  'catalogue.vot',
  'report.html',
  'run.json',
];

const ROWS = fabricatedRows();
let folder = '';

beforeAll(() => {
  execFileSync(process.execPath, [
    fileURLToPath(new URL('../../report/build-page-script.mjs', import.meta.url)),
  ]);
});
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'night-outputs-'));
});
afterEach(() => {
  rmSync(folder, { recursive: true });
});

describe('writeNightOutputs()', () => {
  it('makes the folder and writes the six files, nothing else, and names them', async () => {
    const night = join(folder, 'nights', '2031-04-02');
    const { files } = await writeNightOutputs(readerOf(ROWS), night);
    expect(readdirSync(night).sort()).toEqual(NAMES);
    expect(files.toSorted()).toEqual(NAMES.map((name) => join(night, name)));
  });

  it('writes the same bytes for the same night, in whatever order its rows come', async () => {
    await writeNightOutputs(readerOf(ROWS), join(folder, 'a'));
    await writeNightOutputs(readerOf(ROWS.toReversed()), join(folder, 'b'));
    for (const name of NAMES) {
      expect(readFileSync(join(folder, 'a', name)).equals(readFileSync(join(folder, 'b', name)))).toBe(true);
    }
  });

  it('records where the numbers come from and what came of the night', async () => {
    await writeNightOutputs(readerOf(ROWS, { expected: ROWS.length + 3 }), folder);
    const record = JSON.parse(readFileSync(join(folder, 'run.json'), 'utf8')) as Record<string, unknown>;
    expect(record).toMatchObject({
      night: '2031-04-02',
      run_id: 'run-1',
      recipe_hash: 'a'.repeat(64),
      counts: { expected: ROWS.length + 3, rows: ROWS.length, missing: 3, unreadable: 1 },
      provenance: { program: '0.1.0', templates: { 'galaxy-1': 'd'.repeat(64) } },
    });
  });

  it('leaves the old file and no scraps when one cannot be replaced', async () => {
    await writeNightOutputs(readerOf(ROWS), folder);
    const before = readFileSync(join(folder, 'catalogue.csv'));
    rmSync(join(folder, 'catalogue.fits'));
    // A folder with content cannot be replaced by a file: stands for any failing rename.
    mkdirSync(join(folder, 'catalogue.fits'));
    writeFileSync(join(folder, 'catalogue.fits', 'in-the-way'), '');
    await expect(writeNightOutputs(readerOf(ROWS), folder)).rejects.toThrow();
    expect(readdirSync(folder).sort()).toEqual(NAMES);
    expect(readFileSync(join(folder, 'catalogue.csv')).equals(before)).toBe(true);
  });
});
