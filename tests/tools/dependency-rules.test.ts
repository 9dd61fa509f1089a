import { spawnSync } from 'node:child_process';
import { createRequire } from 'node:module';
import { join } from 'node:path';
import { beforeAll, expect, it } from 'vitest';
import { removeProject, ROOT, temporaryProject } from './temporary-project.ts';

interface Rules {
  readonly forbidden: readonly { readonly name: string }[];
}
const rules = createRequire(import.meta.url)(join(ROOT, '.dependency-cruiser.cjs')) as Rules;

/** One violation per rule: [the file that breaks it, what it imports]. */
const PLANTS: Readonly<Record<string, readonly [from: string, imports: string]>> = {
  'decode-not-to-later-stage': ['pipeline/decode/a1.ts', '../grid/leaf.ts'],
  'grid-not-to-later-stage': ['pipeline/grid/a2.ts', '../match/leaf.ts'],
  'match-not-to-later-stage': ['pipeline/match/a3.ts', '../measure/leaf.ts'],
  'measure-not-to-later-stage': ['pipeline/measure/a4.ts', '../weigh/leaf.ts'],
  'one-door-to-fits-reader': ['pipeline/decode/b1.ts', 'fits-reader'],
  'one-door-to-the-ephemeris': ['pipeline/grid/b2.ts', 'astronomy-engine'],
  'two-doors-to-small-matrices': ['pipeline/match/b3.ts', 'ml-matrix'],
  'one-door-to-the-queue': ['worker/b4.ts', 'bullmq'],
  'one-door-to-the-embedded-queue-database': ['store/b5.ts', '@electric-sql/pglite'],
  'one-door-to-the-database': ['worker/b6.ts', 'kysely'],
  'core-knows-nothing': ['pipeline/core/c1.ts', '../decode/leaf.ts'],
  'encode-is-a-leaf': ['pipeline/encode/c2.ts', '../core/leaf.ts'],
  'stages-do-not-write-files': ['pipeline/weigh/c3.ts', '../encode/leaf.ts'],
  'stage-not-to-composition': ['pipeline/weigh/c4.ts', '../index.ts'],
  'pure-folders-touch-no-machine': ['simulate/c5.ts', 'node:fs'],
  'pure-folders-have-three-packages': ['templates/c6.ts', 'yaml'],
  'pipeline-takes-options-and-templates-as-arguments': ['pipeline/match/c7.ts', '../../config/leaf.ts'],
  'pipeline-not-to-shell': ['pipeline/weigh/c8.ts', '../../store/leaf.ts'],
  'config-is-a-leaf': ['config/c9.ts', '../pipeline/core/leaf.ts'],
  'templates-know-arithmetic-and-fits-only': ['templates/d1.ts', '../pipeline/grid/leaf.ts'],
  'simulate-does-not-use-the-stages': ['simulate/d2.ts', '../pipeline/decode/leaf.ts'],
  'store-keeps-types-only': ['store/d3.ts', '../pipeline/weigh/leaf.ts'],
  'store-not-to-shell': ['store/d4.ts', '../report/leaf.ts'],
  'report-measures-through-one-door': ['report/d5.ts', '../pipeline/measure/leaf.ts'],
  'report-client-runs-in-a-browser': ['report/client/d6.ts', '../leaf.ts'],
  'nobody-imports-the-worker': ['report/d7.ts', '../worker/leaf.ts'],
  'worker-not-to-pages': ['worker/d8.ts', '../report/leaf.ts'],
  'nobody-imports-the-command': ['worker/d9.ts', '../cli/leaf.ts'],
  'not-to-tests': ['cli/e1.ts', '../tests/leaf.ts'],
  'no-circular': ['report/cycle-a.ts', './cycle-b.ts'],
  'not-to-unresolvable': ['cli/e3.ts', './nowhere.ts'],
  'not-to-dev-dependency': ['cli/e4.ts', 'tsx'],
};
/** Imports nothing and nothing imports it. */
const ORPHAN = 'cli/orphan.ts';

const FOLDERS = [
  ...['config', 'templates', 'simulate', 'store', 'worker', 'report', 'cli', 'tests'],
  ...['core', 'encode', 'decode', 'grid', 'match', 'measure', 'weigh'].map((stage) => `pipeline/${stage}`),
];
const PACKAGES = ['fits-reader', 'astronomy-engine', 'ml-matrix', 'bullmq', '@electric-sql/pglite', 'kysely'];

function check(files: Readonly<Record<string, string>>) {
  const folder = temporaryProject(files, [...PACKAGES, 'yaml', 'tsx']);
  const run = spawnSync(process.execPath, [join(ROOT, 'tools/check-dependencies.mjs')], {
    cwd: folder,
    encoding: 'utf8',
  });
  removeProject(folder);
  return { status: run.status, faults: run.stderr, closing: run.stdout };
}

const leaves = Object.fromEntries(FOLDERS.map((folder) => [`${folder}/leaf.ts`, 'export const leaf = 1;\n']));
/** A file that keeps every leaf in use, from where everything may be imported. */
const root = FOLDERS.map((folder, i) => `export { leaf as l${i} } from '../${folder}/leaf.ts';\n`).join('');

let planted: ReturnType<typeof check>;
beforeAll(() => {
  const files: Record<string, string> = {
    ...leaves,
    'tests/root.test.ts': root,
    'pipeline/index.ts': "export { leaf } from './core/leaf.ts';\n",
    'report/cycle-b.ts': "export * from './cycle-a.ts';\n",
    [ORPHAN]: 'export const alone = 1;\n',
  };
  for (const [from, imports] of Object.values(PLANTS)) files[from] = `export * from '${imports}';\n`;
  planted = check(files);
});

it('every rule has a planted violation', () => {
  const named = new Set(rules.forbidden.map((rule) => rule.name));
  expect(new Set([...Object.keys(PLANTS), 'no-orphans'])).toEqual(named);
});

it.each(Object.entries(PLANTS))('%s reports its planted violation', (rule, [from]) => {
  expect(planted.status).toBe(1);
  expect(planted.faults).toContain(`${rule}: ${from}`);
});

it('no-orphans reports a file nothing reaches', () => {
  expect(planted.faults).toContain(`no-orphans: ${ORPHAN}`);
});

it('a tree without violations passes, and the closing line counts what was looked at', () => {
  const clean = check({ ...leaves, 'tests/root.test.ts': root });
  expect(clean.status).toBe(0);
  expect(clean.faults).toBe('');
  expect(clean.closing).toContain(`dependencies: ${FOLDERS.length + 1} modules looked at, 0 violations`);
});

it('a type may cross where its value may not', () => {
  const run = check({
    ...leaves,
    'tests/root.test.ts': `${root}export type { Shape } from '../pipeline/match/user.ts';\n`,
    'config/shape.ts': 'export interface Shape { readonly width: number }\n',
    'pipeline/match/user.ts': "export type { Shape } from '../../config/shape.ts';\n",
  });
  expect(run.faults).toBe('');
});

it('an empty tree fails: a tool that saw nothing proves nothing', () => {
  expect(check({}).status).toBe(1);
});
