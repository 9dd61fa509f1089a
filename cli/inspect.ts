import { readFileSync } from 'node:fs';
import { basename } from 'node:path';
import type { Command } from 'commander';

/** Exit status for input that cannot be read, and for wrong usage. */
const EXIT_UNREADABLE = 1;
const EXIT_USAGE = 2;

/**
 * Add `shiftwork inspect FILE` to the program: what the reader sees in a file, without measuring anything.
 * Exit status 0 when spectra were recognised, 1 when not, 2 when the profile is wrong.
 */
export function registerInspect(program: Command): void {
  program
    .command('inspect')
    .description('say what the reader sees in a file: HDUs, columns, units, frame, spectra, what is missing')
    .argument('<file>', 'FITS (also gzipped) or text')
    .option('--profile <file>', 'input profile (YAML) that says how to read the file')
    .option('--json', 'print one JSON document instead of text')
    .addHelpText(
      'after',
      '\nExamples:\n  shiftwork inspect night/exposure-007.fits\n' +
        '  shiftwork inspect spectrum.txt --profile my-survey.yaml --json',
    )
    .action(async (path: string, options: InspectOptions) => {
      process.exitCode = await inspect(path, options);
    });
}

/** Options of `inspect`. */
export interface InspectOptions {
  readonly profile?: string;
  readonly json?: boolean;
}

/**
 * Run `inspect`.
 *
 * @param path file to look at
 * @returns exit status
 */
async function inspect(path: string, options: InspectOptions): Promise<number> {
  // Loaded here so that other verbs start without the decoder.
  const { inspectInput, inspectLines } = await import('./inspect-report.ts');
  const { DEFAULT_READ_LIMITS, openInput } = await import('../pipeline/decode/index.ts');
  const { InputFault } = await import('../pipeline/errors.ts');
  const { openFile } = await import('../worker/input-file.ts');
  const { parseProfile, ProfileFault } = await import('../config/profile.ts');
  try {
    const profile =
      options.profile === undefined
        ? undefined
        : parseProfile(readFileSync(options.profile, 'utf8'), options.profile);
    const file = openFile(path, basename(path), DEFAULT_READ_LIMITS);
    try {
      const report = inspectInput(openInput(file.source, DEFAULT_READ_LIMITS), profile);
      const text = options.json === true ? JSON.stringify(report, null, 2) : inspectLines(report).join('\n');
      process.stdout.write(`${text}\n`);
      return report.layout === null ? EXIT_UNREADABLE : 0;
    } finally {
      file.close();
    }
  } catch (error) {
    if (error instanceof ProfileFault || isNoSuchFile(error)) {
      process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
      return EXIT_USAGE;
    }
    if (!(error instanceof InputFault)) throw error;
    process.stderr.write(`${error.message}\n`);
    return EXIT_UNREADABLE;
  }
}

function isNoSuchFile(error: unknown): boolean {
  return error instanceof Error && 'code' in error && (error.code === 'ENOENT' || error.code === 'EISDIR');
}
