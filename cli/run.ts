import type { Command } from 'commander';
import { existsSync } from 'node:fs';
import { join } from 'node:path';
import type { RunProgress, RunSummary } from '../worker/run-night.ts';
import { type CommonFlags, readConfiguration, withCommonFlags } from './configuration.ts';
import { EXIT } from './exit-status.ts';
import { progressLine, type ProgressLine } from './progress-line.ts';
import { stopSignal } from './stop-signal.ts';

interface RunFlags extends CommonFlags {
  readonly night?: string;
  readonly profile?: string;
  readonly threads?: string;
  readonly chunk?: string;
  readonly again?: boolean;
  readonly dryRun?: boolean;
}

const EXAMPLES = `
Examples:
  shiftwork run nights/2031-04-02
  shiftwork run exposures/*.fits --night 2031-04-02 --workspace /data/shiftwork
  shiftwork run faint.txt --profile my-survey.yaml --set resolvingPower=500
  shiftwork run nights/2031-04-02 --dry-run     say what would be measured
  shiftwork run nights/2031-04-02 --again       measure everything anew

A run that was stopped or killed goes on where it was when it is started again.`;

/** The last file that is written of a night: when it is there, all are. */
const LAST_WRITTEN = 'report.html';

/** `shiftwork run PATH…`: one go on this machine, from files to catalogue and report. */
export function registerRun(program: Command): void {
  withCommonFlags(program.command('run'))
    .description('measure files or folders on this machine and write catalogue and report')
    .argument('<path...>', 'files or folders of one night')
    .option('--night <name>', "the night's name (default: the observing night, else the folder's name)")
    .option('--profile <file>', 'how to read the files (YAML), where they do not tell themselves')
    .option('--threads <n>', 'threads that measure (default: one for each processor)')
    .option('--chunk <n>', 'spectra of one job (default: from measured speed)')
    .option('--again', 'measure every spectrum again')
    .option('--dry-run', 'only list what would be measured')
    .addHelpText('after', EXAMPLES)
    .action(runVerb);
}

async function runVerb(paths: string[], flags: RunFlags): Promise<void> {
  const configuration = await readConfiguration(flags, { threads: flags.threads, chunk: flags.chunk });
  const { operating, measuring } = configuration;
  const profile = await profileFrom(flags.profile);
  const night = flags.night ?? null;
  if (flags.dryRun === true) {
    const { printPlan } = await import('./dry-run.ts');
    await printPlan({ paths, night, profile, workspace: operating.workspace });
    return;
  }
  const { runNight } = await import('../worker/index.ts');
  const { poolOptions, provenanceOf } = await import('./run-settings.ts');
  const { nightReader } = await import('../store/index.ts');
  const stop = stopSignal(() => {
    process.stderr.write('\nstopping after the chunks in hand; once more to stop at once\n');
  });
  try {
    const summary = await runNight(
      {
        ...{ paths, night, profile, measuring, workspace: operating.workspace },
        ...{ chunkSize: operating.chunk, again: flags.again === true, signal: stop.signal },
        pool: poolOptions(operating),
        provenance: provenanceOf(configuration),
        progress: progressOnStderr(),
      },
      async (store, done) => {
        if (done.interrupted || done.missing > 0) return;
        const folder = done.workspace.night(done.night);
        // Nothing moved since they were written; verdicts reach them through `shiftwork report`.
        if (done.measured === 0 && existsSync(join(folder, LAST_WRITTEN))) return;
        const { writeNightOutputs } = await import('../report/index.ts');
        await writeNightOutputs(await nightReader(store, done.night), folder);
      },
    );
    printSummary(summary);
    process.exitCode = summary.interrupted
      ? EXIT.interrupted
      : summary.missing > 0
        ? EXIT.missing
        : EXIT.complete;
  } finally {
    stop.release();
  }
}

/** @throws ProfileFault, UsageFault */
async function profileFrom(path: string | undefined) {
  if (path === undefined) return null;
  const { readProfile } = await import('./read-profile.ts');
  return readProfile(path);
}

function progressOnStderr(): RunProgress {
  let line: ProgressLine | null = null;
  let expected = 0;
  return {
    planning: (done, of) => {
      line ??= progressLine('read   ', of);
      line.update(done);
      if (done === of) line.end();
    },
    planned: (plan, missing) => {
      expected = plan.inputs.reduce((sum, { spectra }) => sum + spectra.length, 0);
      process.stderr.write(
        `night ${plan.night}: ${expected} spectra in ${plan.inputs.length} files, ${missing} to measure\n`,
      );
      line = progressLine('measure', missing);
    },
    measured: (rows) => {
      line?.update(rows);
    },
  };
}

/** Results go to stdout, in plain words. */
function printSummary(summary: RunSummary): void {
  const { counts, night, workspace } = summary;
  const lines: string[] = [];
  if (summary.measured === 0 && summary.missing === 0 && !summary.interrupted) {
    lines.push(`night ${night}: all ${counts.done} rows are current, nothing was measured`);
  } else {
    lines.push(`night ${night}: ${summary.measured} spectra measured in this run`);
  }
  lines.push(
    `rows ${counts.done} of ${counts.expected}; ${counts.needsReview} ask for a look; ` +
      `${counts.faults} could not be read or were set aside`,
  );
  const stages = Object.entries(summary.stageMs).map(([stage, ms]) => `${stage} ${ms.toFixed(1)}`);
  if (stages.length > 0) lines.push(`milliseconds per spectrum: ${stages.join(', ')}`);
  if (summary.leftOut.length > 0) {
    const names = summary.leftOut.slice(0, 5).map(({ relativePath }) => relativePath);
    const more = summary.leftOut.length > names.length ? ', ...' : '';
    lines.push(`left out, not spectra: ${names.join(', ')}${more}`);
  }
  if (summary.interrupted) lines.push('interrupted: the same command goes on from here');
  else if (summary.missing > 0) lines.push(`${summary.missing} spectra have no row: see ${workspace.logs}`);
  else lines.push(`catalogue and report: ${workspace.night(night)}`);
  process.stdout.write(`${lines.join('\n')}\n`);
}
