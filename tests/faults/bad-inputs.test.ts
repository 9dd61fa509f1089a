import { appendFileSync, mkdirSync, rmSync, truncateSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, it } from 'vitest';
import {
  BLIND,
  ENDS_ITS_THREAD,
  exposureFile,
  freshFolder,
  NEVER_ENDS,
  practiceFolder,
  THROWS,
} from '../worker/practice-folder.ts';
import { freshWorkspace } from '../worker/fresh-workspace.ts';
import { PRACTICE_POOL, practiceRun, rowsOf } from '../worker/practice-run.ts';

it('a truncated file, an empty one and a broken gzip each end as a row that says why, and cost no other row', async () => {
  const folder = practiceFolder();
  truncateSync(join(folder, 'late.fits'), 5_000);
  writeFileSync(join(folder, 'empty.fits'), '');
  writeFileSync(join(folder, 'broken.fits.gz'), Uint8Array.of(0x1f, 0x8b, 8, 0, 1, 2, 3));
  writeFileSync(join(folder, 'notes.txt'), 'the moon was up\n');
  const workspace = await freshWorkspace();
  const summary = await practiceRun(folder, workspace);
  expect(summary.missing).toBe(0);
  expect(summary.leftOut.map(({ relativePath }) => relativePath)).toEqual(['notes.txt']);
  const rows = await rowsOf(workspace);
  const unreadable = rows.filter(({ reasons }) => reasons === 'unreadable').map((row) => row.spectrum_id);
  expect(unreadable).toContain('2031-04-02/empty');
  expect(unreadable).toContain('2031-04-02/broken');
  expect(unreadable.some((id) => id.startsWith('2031-04-02/late'))).toBe(true);
  expect(rows.filter(({ input_file, kind }) => input_file === 'early.fits' && kind !== null)).toHaveLength(
    12,
  );
});

it('a row without one usable pixel, and one that is set aside, are still known by their target and fibre', async () => {
  const folder = join(freshFolder('night'), 'blind');
  mkdirSync(folder);
  const levels = [100, BLIND, ENDS_ITS_THREAD, 110, 0, 0, 0, BLIND];
  writeFileSync(join(folder, 'one.fits'), exposureFile('one', levels, 5));
  const workspace = await freshWorkspace();
  await practiceRun(folder, workspace);
  const faults = (await rowsOf(workspace)).filter(({ reasons }) => reasons !== '');
  expect(faults).toMatchObject([
    { reasons: 'unreadable', target_name: 'one-target-1', fibre: 1, role: 'target' },
    { reasons: 'over-limits', target_name: 'one-target-2', fibre: 2, role: 'target' },
    { reasons: 'unreadable', target_name: 'one-sky-7', fibre: 7, role: 'sky' },
  ]);
});

it.each([
  [
    'vanishes',
    (path: string) => {
      rmSync(path);
    },
  ],
  [
    'changes',
    (path: string) => {
      appendFileSync(path, new Uint8Array(2_880));
    },
  ],
])(
  'a file that %s between plan and work ends as rows that say so, and is measured when it is back',
  async (_title, harm) => {
    const folder = practiceFolder();
    const workspace = await freshWorkspace();
    const late = join(folder, 'late.fits');
    const progress = {
      planning: () => undefined,
      planned: () => {
        harm(late);
      },
      measured: () => undefined,
    };
    await practiceRun(folder, workspace, { progress });
    const faults = (await rowsOf(workspace)).filter(({ reasons }) => reasons === 'unreadable');
    expect(faults.map(({ input_file }) => input_file)).toEqual(Array<string>(12).fill('late.fits'));
    const levels = Array.from({ length: 12 }, (_, row) => (row < 8 ? 100 + 10 * row + 1 : 0));
    writeFileSync(late, exposureFile('late', levels, 12));
    await practiceRun(folder, workspace);
    expect((await rowsOf(workspace)).filter(({ reasons }) => reasons === 'unreadable')).toEqual([]);
  },
);

it('a spectrum that never ends, one that ends its thread and one that meets a bug each stand alone in the end', {
  timeout: 180_000,
}, async () => {
  const folder = join(freshFolder('night'), 'poison');
  mkdirSync(folder);
  const levels = [100, 110, NEVER_ENDS, 120, ENDS_ITS_THREAD, 130, THROWS, 140, 0, 0, 0, 0];
  writeFileSync(join(folder, 'one.fits'), exposureFile('one', levels, 5));
  const workspace = await freshWorkspace();
  const summary = await practiceRun(folder, workspace, {
    chunkSize: 12,
    pool: { ...PRACTICE_POOL, spectrumLimitMs: 3_000 },
  });
  expect(summary.missing).toBe(0);
  const reasons = (await rowsOf(workspace))
    .toSorted((a, b) => a.input_row! - b.input_row!)
    .map((row) => row.reasons);
  expect(reasons).toEqual([
    '',
    '',
    'over-limits',
    '',
    'over-limits',
    '',
    'unreadable',
    ...Array<string>(5).fill(''),
  ]);
});
