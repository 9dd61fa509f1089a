import { spawnSync } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { delimiter, join } from 'node:path';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { removeProject, ROOT, temporaryProject } from './temporary-project.ts';

const { scripts } = JSON.parse(readFileSync(join(ROOT, 'package.json'), 'utf8')) as {
  readonly scripts: Readonly<Record<string, string>>;
};
/** The parts of `npm run check`, in its order. The dependency rules have a test file of their own. */
const PARTS = ['format:check', 'lint', 'check:dependencies', 'typecheck', 'test:run'];

const SOUND = 'store/sound.ts';
const PLANTS = {
  type: { file: 'store/wrong-type.ts', content: "export const count: number = 'many';\n" },
  unformatted: { file: 'store/unformatted.ts', content: 'export const  count=1\n' },
  floatingPromise: {
    file: 'store/floating-promise.ts',
    content: 'async function work(): Promise<void> {\n  await work();\n}\nwork();\n',
  },
  clock: { file: 'simulate/clock.ts', content: 'export const now = (): number => Date.now();\n' },
  chance: { file: 'pipeline/chance.ts', content: 'export const chance = (): number => Math.random();\n' },
  excuse: {
    file: 'store/excuse.ts',
    content: `${['/* eslint', 'disable no-restricted-globals */'].join('-')}\nexport const excused = 1;\n`,
  },
  longSource: { file: 'store/long.ts', content: lines(401) },
  longTool: { file: 'tools/long.mjs', content: lines(401) },
  longEnough: { file: 'store/long-enough.ts', content: lines(400) },
} as const;

function lines(count: number): string {
  return Array.from({ length: count }, (_, i) => `export const line${i} = ${i};\n`).join('');
}

let folder: string;
beforeAll(() => {
  const planted = Object.values(PLANTS).map(({ file, content }) => [file, content] as const);
  folder = temporaryProject(
    { ...Object.fromEntries(planted), [SOUND]: 'export const sound = 1;\n' },
    'linked',
  );
});
afterAll(() => {
  removeProject(folder);
});

/** Runs one part as package.json words it, in the planted folder. */
function part(name: string) {
  const run = spawnSync(scripts[name] ?? '', {
    cwd: folder,
    shell: true,
    encoding: 'utf8',
    env: {
      ...process.env,
      NO_COLOR: '1',
      PATH: `${join(ROOT, 'node_modules/.bin')}${delimiter}${process.env['PATH'] ?? ''}`,
    },
  });
  return { failed: run.status !== 0, said: run.stdout + run.stderr };
}

it('`npm run check` runs every part and stops at the first that fails', () => {
  expect(scripts['check']).toBe(PARTS.map((name) => `npm run ${name}`).join(' && '));
});

it('the type check fails on a planted type error and on nothing else', () => {
  const { failed, said } = part('typecheck');
  expect(failed).toBe(true);
  expect(said).toContain(PLANTS.type.file);
  expect(said.match(/error TS/g)).toHaveLength(1);
});

it('the format check fails on a planted unformatted file and on nothing else', () => {
  const { failed, said } = part('format:check');
  expect(failed).toBe(true);
  expect(said).toContain(PLANTS.unformatted.file);
  expect(said).not.toContain(SOUND);
  expect(said).not.toContain(PLANTS.type.file);
});

it('the linter fails on each planted fault and passes sound files', () => {
  const { failed, said } = part('lint');
  expect(failed).toBe(true);
  const faults = faultsByFile(said);
  expect(faults[PLANTS.floatingPromise.file]).toContain('no-floating-promises');
  expect(faults[PLANTS.clock.file]).toContain('no-restricted-globals');
  expect(faults[PLANTS.chance.file]).toContain('no-restricted-properties');
  expect(faults[PLANTS.excuse.file]).toContain('has no effect');
  expect(faults[PLANTS.longSource.file]).toContain('max-lines');
  expect(faults[PLANTS.longTool.file]).toContain('max-lines');
  expect(faults[PLANTS.longEnough.file]).toBeUndefined();
  expect(faults[SOUND]).toBeUndefined();
});

/** ESLint's listing: a file's full path on a line of its own, then its faults, indented. */
function faultsByFile(said: string): Readonly<Record<string, string>> {
  const found: Record<string, string> = {};
  let file = '';
  for (const line of said.split('\n')) {
    const start = line.indexOf(folder);
    if (start >= 0) file = line.slice(start + folder.length + 1).trim();
    else if (line.startsWith(' ')) found[file] = (found[file] ?? '') + line;
  }
  return found;
}
