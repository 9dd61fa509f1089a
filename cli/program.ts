import { Command } from 'commander';
import { registerConfig } from './config.ts';
import { registerEnqueue } from './enqueue.ts';
import { registerInspect } from './inspect.ts';
import { programVersion } from './program-version.ts';
import { registerReport } from './report.ts';
import { registerRequeue } from './requeue.ts';
import { registerReview } from './review.ts';
import { registerRun } from './run.ts';
import { registerScorecard } from './scorecard.ts';
import { registerSimulate } from './simulate.ts';
import { registerStatus } from './status.ts';
import { registerTemplates } from './templates.ts';
import { registerWork } from './work.ts';

/** Every verb of the command, none of them loaded: what a verb needs is imported when it is used. */
export function createProgram(): Command {
  const program = new Command('shiftwork')
    .description(
      'Measures what each object of a spectroscopic survey night is, and its redshift or velocity.',
    )
    .version(programVersion())
    .showHelpAfterError('(see shiftwork --help)')
    .addHelpText('after', EXAMPLES)
    .exitOverride();
  for (const register of [
    registerRun,
    registerEnqueue,
    registerWork,
    registerStatus,
    registerReport,
    registerReview,
    registerRequeue,
    registerInspect,
    registerSimulate,
    registerScorecard,

    registerTemplates,
    registerConfig,
  ]) {
    register(program);
  }
  for (const verb of program.commands) verb.exitOverride();
  return program;
}

const EXAMPLES = `
Examples:
  shiftwork run nights/2031-04-02          measure a folder, write catalogue and report
  shiftwork status                         how far every night is
  shiftwork requeue 2031-04-02 --failed    put what could not be read back, then run again
  shiftwork config                         every option, its value, and why it is what it is

Exit status: 0 every expected spectrum has a row; 1 something is missing; 2 wrong usage;
3 the workspace is busy; 4 the machine is at fault (disk full, no server); 130 interrupted.`;
