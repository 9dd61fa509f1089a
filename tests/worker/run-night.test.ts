import { existsSync, renameSync } from 'node:fs';
import { join } from 'node:path';
import { beforeAll, expect, it } from 'vitest';
import { workspaceAt } from '../../worker/workspace.ts';
import { freshWorkspace } from './fresh-workspace.ts';
import { practiceFolder } from './practice-folder.ts';
import { practiceRun, rowsOf } from './practice-run.ts';

let folder: string;
let workspace: string;
beforeAll(async () => {
  folder = practiceFolder();
  workspace = await freshWorkspace();
  await practiceRun(folder, workspace);
});

it('runNight() ends with a row for every expected spectrum, named by night, file, HDU and row', async () => {
  const rows = await rowsOf(workspace);
  expect(rows).toHaveLength(25);
  expect(rows[0]!.spectrum_id).toBe('2031-04-02/early#1.0');
  expect(rows.at(-1)!.spectrum_id).toMatch(/^2031-04-02\/single#/);
  expect(rows.filter(({ role }) => role === 'sky')).toHaveLength(8);
});

it('runNight() hands the noise of the exposure to every spectrum of it and to no other', async () => {
  const rows = await rowsOf(workspace);
  const factors = (name: string) =>
    new Set(rows.filter((row) => row.input_file.startsWith(name)).map((row) => row.noise_factor));
  expect(factors('early').size).toBe(1);
  expect(factors('late').size).toBe(1);
  expect(factors('early')).not.toEqual(factors('late'));
  expect([...factors('single')]).toEqual([0]);
});

it('runNight() measures nothing the second time, says so, and does not even start the queue', async () => {
  const jobs = join(workspaceAt(workspace).queue, 'jobs');
  renameSync(jobs, `${jobs}-aside`);
  const again = await practiceRun(folder, workspace);
  expect(again).toMatchObject({ measured: 0, missing: 0 });
  expect(existsSync(jobs)).toBe(false);
  renameSync(`${jobs}-aside`, jobs);
});

it('runNight() measures everything again when asked, and gets the same rows', async () => {
  const before = await rowsOf(workspace);
  const again = await practiceRun(folder, workspace, { again: true });
  expect(again.measured).toBe(25);
  expect(await rowsOf(workspace)).toEqual(before);
});
