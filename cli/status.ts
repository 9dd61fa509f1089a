import type { Command } from 'commander';
import { type CommonFlags, readConfiguration, withCommonFlags } from './configuration.ts';
import { durationText } from './progress-line.ts';
import { UsageFault } from './exit-status.ts';

const EXAMPLES = `
Examples:
  shiftwork status
  shiftwork status 2031-04-02 --json

Only reads the store, so it always works, also while another process measures.`;

/** `shiftwork status [NIGHT]`: how far every night is. */
export function registerStatus(program: Command): void {
  withCommonFlags(program.command('status'))
    .description('what is waiting, done and failed, the rate and the time left')
    .argument('[night]', 'one night only')
    .option('--json', 'as JSON')
    .addHelpText('after', EXAMPLES)
    .action(async (night: string | undefined, flags: CommonFlags & { json?: boolean }) => {
      const { operating } = await readConfiguration(flags);
      const { workspaceStatus } = await import('../worker/index.ts');
      const status = await workspaceStatus(operating.workspace, new Date());
      const nights = status.nights.filter(({ name }) => night === undefined || name === night);
      if (night !== undefined && nights.length === 0) {
        throw new UsageFault(`NIGHT must be one of the workspace, got ${night}`);
      }
      if (flags.json === true) {
        process.stdout.write(`${JSON.stringify({ ...status, nights }, null, 2)}\n`);
        return;
      }
      const owner = status.owner;
      const lines = [
        owner === null ? 'nobody works here' : `process ${owner.pid} works here since ${owner.startedAt}`,
        ...nights.map((one) => {
          const rate = one.spectraPerSecond === null ? '' : `, ${one.spectraPerSecond.toPrecision(2)}/s`;
          const left = one.secondsLeft === null ? '' : `, ${durationText(one.secondsLeft)} left`;
          return (
            `${one.name}: ${one.done} of ${one.expected} done, ${one.waiting} waiting, ` +
            `${one.faults} failed, ${one.needsReview} ask for a look${rate}${left}`
          );
        }),
      ];
      process.stdout.write(`${lines.join('\n')}\n`);
    });
}
