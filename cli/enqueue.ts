import type { Command } from 'commander';
import { type CommonFlags, readConfiguration, withCommonFlags } from './configuration.ts';

interface EnqueueFlags extends CommonFlags {
  readonly night?: string;
  readonly profile?: string;
  readonly chunk?: string;
}

const EXAMPLES = `
Examples:
  shiftwork enqueue nights/2031-04-02
  SHIFTWORK_REDIS_URL=redis://queue:6379 shiftwork enqueue nights/2031-04-02

Without Redis the night waits in the store until \`shiftwork work\` or \`shiftwork run\` takes it up.`;

/** `shiftwork enqueue PATH…`: plan a night and leave the measuring to workers. */
export function registerEnqueue(program: Command): void {
  withCommonFlags(program.command('enqueue'))
    .description('put a night on the queue for workers to measure')
    .argument('<path...>', 'files or folders of one night')
    .option('--night <name>', "the night's name (default: the observing night, else the folder's name)")
    .option('--profile <file>', 'how to read the files (YAML), where they do not tell themselves')
    .option('--chunk <n>', 'spectra of one job (default: from measured speed)')
    .addHelpText('after', EXAMPLES)
    .action(async (paths: string[], flags: EnqueueFlags) => {
      const configuration = await readConfiguration(flags, { chunk: flags.chunk });
      const { enqueueNight } = await import('../worker/index.ts');
      const { poolOptions, provenanceOf } = await import('./run-settings.ts');
      const { readProfile } = await import('./read-profile.ts');
      const { operating, measuring } = configuration;
      const { night, missing } = await enqueueNight({
        paths,
        night: flags.night ?? null,
        profile: flags.profile === undefined ? null : readProfile(flags.profile),
        measuring,
        workspace: operating.workspace,
        redisUrl: operating.redisUrl,
        chunkSize: operating.chunk,
        threads: poolOptions(operating).threads,
        provenance: provenanceOf(configuration),
      });
      const where = operating.redisUrl === null ? 'in the store, for the next worker or run' : 'on the queue';
      process.stdout.write(`night ${night}: ${missing} spectra ${where}\n`);
    });
}
