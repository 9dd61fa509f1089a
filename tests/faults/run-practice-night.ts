import { PRACTICE_POOL, practiceRun } from '../worker/practice-run.ts';

/** A process of its own for the kill test: `run-practice-night.ts FOLDER WORKSPACE`. */
const [folder, workspace] = process.argv.slice(2);
const summary = await practiceRun(folder!, workspace!, {
  chunkSize: 1,
  pool: { ...PRACTICE_POOL, threads: 1 },
});
process.exitCode = summary.missing === 0 ? 0 : 1;
