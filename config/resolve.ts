import { parse } from 'yaml';
import { MEASURING_OPTIONS, type MeasuringOptions } from './measuring.ts';
import { OPERATING_OPTIONS, type OperatingOptions } from './operating.ts';
import { type OptionDescription, OptionFault, type OptionValue, readOption } from './option.ts';

/** Where the value of an option came from, strongest last. */
export type Origin = 'default' | 'file' | 'environment' | 'command line';

/** One option as `shiftwork config` shows it. */
export interface ResolvedOption {
  readonly name: string;
  readonly group: 'measuring' | 'operating';
  readonly value: OptionValue;
  readonly origin: Origin;
  readonly description: OptionDescription<OptionValue>;
}

export interface Configuration {
  readonly measuring: MeasuringOptions;
  readonly operating: OperatingOptions;
  /** Every option in the order of its description. */
  readonly options: readonly ResolvedOption[];
}

export interface ConfigurationSources {
  /** Options given on the command line, by name; absent or undefined = not given. */
  readonly commandLine: Readonly<Record<string, unknown>>;
  /** SHIFTWORK_REDIS_URL sets redisUrl, and so on. */
  readonly environment: Readonly<Record<string, string | undefined>>;
  /** Text of a configuration file (YAML: option names and values), and what messages call it. */
  readonly file?: { readonly text: string; readonly label: string };
}

/**
 * Puts the options together: command line over environment over file over default.
 *
 * @throws OptionFault when a value cannot be used or the file names an option that does not exist
 */
export function resolveConfiguration(sources: ConfigurationSources): Configuration {
  const file = readFile(sources.file);
  const groups = [
    ['measuring', Object.entries(MEASURING_OPTIONS)],
    ['operating', Object.entries(OPERATING_OPTIONS)],
  ] as const;
  const options = groups.flatMap(([group, entries]) =>
    entries.map(([name, description]: [string, OptionDescription<OptionValue>]): ResolvedOption => {
      const found: [Origin, unknown][] = [
        ['command line', sources.commandLine[name]],
        ['environment', sources.environment[environmentName(name)]],
        ['file', file[name]],
      ];
      for (const [origin, given] of found) {
        if (given === undefined || given === '') continue;
        const value = readOption(`${name} (${origin})`, description, given);
        return { name, group, value, origin, description };
      }
      return { name, group, value: description.default, origin: 'default', description };
    }),
  );
  const known = new Set(options.map(({ name }) => name));
  for (const name of Object.keys(file)) {
    if (!known.has(name)) {
      throw new OptionFault(`${sources.file!.label} must name options of \`shiftwork config\`, got ${name}`);
    }
  }
  const group = (wanted: string) =>
    Object.fromEntries(options.filter((one) => one.group === wanted).map(({ name, value }) => [name, value]));
  return {
    measuring: group('measuring') as unknown as MeasuringOptions,
    operating: group('operating') as unknown as OperatingOptions,
    options,
  };
}

/** `redisUrl` is SHIFTWORK_REDIS_URL. */
export function environmentName(option: string): string {
  return `SHIFTWORK_${option.replace(/[A-Z]/g, (letter) => `_${letter}`).toUpperCase()}`;
}

function readFile(file: ConfigurationSources['file']): Readonly<Record<string, unknown>> {
  if (file === undefined) return {};
  let content: unknown;
  try {
    // `maxAliasCount` keeps a small file from unfolding into a huge one.
    content = parse(file.text, { maxAliasCount: 20 });
  } catch (error) {
    throw new OptionFault(`${file.label} must be YAML, got: ${(error as Error).message}`);
  }
  if (content === null) return {};
  if (typeof content !== 'object' || Array.isArray(content)) {
    throw new OptionFault(`${file.label} must hold option names and values, got ${JSON.stringify(content)}`);
  }
  return content as Record<string, unknown>;
}
