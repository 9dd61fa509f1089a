import type { Command } from 'commander';
import { type CommonFlags, readConfiguration, withCommonFlags } from './configuration.ts';

/** `shiftwork config`: every option, its value, where it came from and why the default is what it is. */
export function registerConfig(program: Command): void {
  withCommonFlags(program.command('config'))
    .description('print every option, its value, where it came from and why the default is what it is')
    .option('--json', 'as JSON')
    .action(async (flags: CommonFlags & { json?: boolean }) => {
      const { environmentName } = await import('../config/resolve.ts');
      const { options } = await readConfiguration(flags);
      if (flags.json === true) {
        const plain = options.map(({ name, group, value, origin, description }) => {
          return { name, group, value, origin, environment: environmentName(name), ...description };
        });
        process.stdout.write(`${JSON.stringify(plain, null, 2)}\n`);
        return;
      }
      for (const { name, group, value, origin, description } of options) {
        const unit = description.unit === '' ? '' : ` (${description.unit})`;
        const range =
          description.range === null ? '' : `, ${description.range[0]} to ${description.range[1]}`;
        process.stdout.write(
          `${name} = ${String(value ?? 'none')}${unit}${range}\n` +
            `  ${origin}; ${group}; ${environmentName(name)}\n  ${description.why}\n`,
        );
      }
    });
}
