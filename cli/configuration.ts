import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { Command } from 'commander';
import type { Configuration } from '../config/resolve.ts';
import { OPERATING_OPTIONS } from '../config/operating.ts';
import { UsageFault } from './exit-status.ts';

/** Name of the configuration file inside a workspace. */
const FILE_NAME = 'config.yaml';

/** What every verb that touches a workspace understands. */
export interface CommonFlags {
  readonly workspace?: string;
  readonly config?: string;
  readonly set?: readonly string[];
}

/** Adds the flags every such verb has. */
export function withCommonFlags(verb: Command): Command {
  return verb
    .option(
      '--workspace <folder>',
      `where everything is kept (default ${OPERATING_OPTIONS.workspace.default})`,
    )
    .option('--config <file>', `YAML of options (default: ${FILE_NAME} in the workspace, if there is one)`)
    .option('--set <option=value...>', 'set any option of `shiftwork config`');
}

/**
 * Puts the configuration together from flags, environment and file.
 *
 * @param flags as parsed; further flags may be given by option name in `more`
 * @throws OptionFault, UsageFault
 */
export async function readConfiguration(
  flags: CommonFlags,
  more: Readonly<Record<string, unknown>> = {},
): Promise<Configuration> {
  const { resolveConfiguration } = await import('../config/resolve.ts');
  const commandLine: Record<string, unknown> = { ...more, workspace: flags.workspace };
  for (const setting of flags.set ?? []) {
    const [name, value] = setting.split(/=(.*)/s);
    if (name === undefined || value === undefined) {
      throw new UsageFault(`--set must be option=value, got ${setting}`);
    }
    commandLine[name] = value;
  }
  const environment = process.env;
  const sources = { commandLine, environment };
  // The workspace may come from any source but its own file.
  const workspace = resolveConfiguration(sources).operating.workspace;
  const path = flags.config ?? join(workspace, FILE_NAME);
  if (!existsSync(path)) {
    if (flags.config !== undefined) throw new UsageFault(`--config must name a file, got ${path}`);
    return checked(resolveConfiguration(sources), commandLine);
  }
  const file = { text: readFileSync(path, 'utf8'), label: path };
  return checked(resolveConfiguration({ ...sources, file }), commandLine);
}

/** @throws UsageFault when --set names an option that does not exist */
function checked(
  configuration: Configuration,
  commandLine: Readonly<Record<string, unknown>>,
): Configuration {
  const known = new Set(configuration.options.map(({ name }) => name));
  for (const name of Object.keys(commandLine)) {
    if (!known.has(name))
      throw new UsageFault(`--set must name an option of \`shiftwork config\`, got ${name}`);
  }
  return configuration;
}
