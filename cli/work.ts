import type { Command } from 'commander';
import { type CommonFlags, readConfiguration, withCommonFlags } from './configuration.ts';
import { EXIT } from './exit-status.ts';
import { stopSignal } from './stop-signal.ts';

interface WorkFlags extends CommonFlags {
  readonly threads?: string;
  readonly untilEmpty?: boolean;
}

const EXAMPLES = `
Examples:
  shiftwork work
  SHIFTWORK_REDIS_URL=redis://queue:6379 shiftwork work --threads 8
  shiftwork work --until-empty        stop when every queued night is finished

SIGTERM or Ctrl-C: finish the chunks in hand, then end with status 0.`;

/** `shiftwork work`: be a worker until told to stop. */
export function registerWork(program: Command): void {
  withCommonFlags(program.command('work'))
    .description('take chunks off the queue and measure them until told to stop')
    .option('--threads <n>', 'threads that measure (default: one for each processor)')
    .option('--until-empty', 'stop when every queued night is finished')
    .addHelpText('after', EXAMPLES)
    .action(async (flags: WorkFlags) => {
      const { operating } = await readConfiguration(flags, { threads: flags.threads });
      const { workUntilStopped } = await import('../worker/index.ts');
      const { poolOptions } = await import('./run-settings.ts');
      const stop = stopSignal(() => {
        process.stderr.write('stopping after the chunks in hand; once more to stop at once\n');
      });
      try {
        const rows = await workUntilStopped({
          workspace: operating.workspace,
          redisUrl: operating.redisUrl,
          chunkSize: operating.chunk,
          pool: poolOptions(operating),
          untilEmpty: flags.untilEmpty === true,
          signal: stop.signal,
          onForeignRecipe: (night, missing) => {
            process.stderr.write(
              `night ${night} is left alone with ${missing} spectra to measure: it was queued by another ` +
                'version or with other family files; `shiftwork enqueue` or `shiftwork run` plans it anew\n',
            );
            if (flags.untilEmpty === true) process.exitCode = EXIT.missing;
          },
        });
        process.stdout.write(`${rows} spectra measured by this worker\n`);
      } finally {
        stop.release();
      }
    });
}
