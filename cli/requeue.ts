import type { Command } from 'commander';
import { type CommonFlags, readConfiguration, withCommonFlags } from './configuration.ts';
import { UsageFault } from './exit-status.ts';

interface RequeueFlags extends CommonFlags {
  readonly failed?: boolean;
  readonly all?: boolean;
  readonly spectrum?: readonly string[];
}

const EXAMPLES = `
Examples:
  shiftwork requeue 2031-04-02 --failed
  shiftwork requeue 2031-04-02 --spectrum 2031-04-02/exposure-1#1.17
  shiftwork requeue 2031-04-02 --all

The rows stay as they are until a worker or the next run has measured the spectra again.`;

/** `shiftwork requeue NIGHT`: put failed or chosen spectra back. */
export function registerRequeue(program: Command): void {
  withCommonFlags(program.command('requeue'))
    .description('put failed or chosen spectra of a night back on the queue')
    .argument('<night>', 'name of the night')
    .option('--failed', 'those that could not be read or were set aside')
    .option('--spectrum <id...>', 'these spectra')
    .option('--all', 'all of them')
    .addHelpText('after', EXAMPLES)
    .action(async (night: string, flags: RequeueFlags) => {
      const chosen = flags.all === true ? 'all' : flags.failed === true ? 'failed' : (flags.spectrum ?? null);
      if (chosen === null) throw new UsageFault('requeue must be told --failed, --spectrum or --all');
      const { operating } = await readConfiguration(flags);
      const { requeueSpectra } = await import('../worker/index.ts');
      const count = await requeueSpectra(operating.workspace, night, chosen);
      if (count === null) throw new UsageFault(`NIGHT must be one of the workspace, got ${night}`);
      process.stdout.write(`night ${night}: ${count} spectra wait for the next worker or run\n`);
    });
}
