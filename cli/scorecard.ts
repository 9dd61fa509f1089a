import { readFile } from 'node:fs/promises';
import type { Command } from 'commander';
import { EXIT, UsageFault } from './exit-status.ts';

interface ScorecardOptions {
  readonly limits: string;
  readonly json?: boolean;
}

/** Adds `shiftwork scorecard CATALOGUE TRUTH`: holds a catalogue against known truth. */
export function registerScorecard(program: Command): void {
  program
    .command('scorecard')
    .description('compare a catalogue with known truth: right, wrong, flagged, errors, calibration')
    .argument('<catalogue>', 'catalogue.csv of a night')
    .argument('<truth>', 'CSV with file, row or select (target name), kind, redshift, group')
    .option(
      '--limits <list>',
      'other limits for right, km/s, by kind or group and kind: star=150,faint/galaxy=600',
      '',
    )
    .option('--json', 'print the numbers as JSON')
    .addHelpText(
      'after',
      '\nExample:\n  shiftwork scorecard shiftwork/nights/2031-04-02/catalogue.csv practice/truth.csv\n',
    )
    .action(async (catalogue: string, truth: string, options: ScorecardOptions) => {
      process.exitCode = await scorecard(catalogue, truth, options);
    });
}

async function scorecard(catalogue: string, truth: string, options: ScorecardOptions): Promise<number> {
  const { limitsWith, readCatalogue, readTruth, scoreCatalogue, scorecardText } = await import(
    '../simulate/scorecard/index.ts'
  );
  try {
    const card = scoreCatalogue(
      readCatalogue(await readFile(catalogue, 'utf8')),
      readTruth(await readFile(truth, 'utf8')),
      limitsWith(options.limits),
    );
    process.stdout.write(options.json === true ? `${JSON.stringify(card, null, 2)}\n` : scorecardText(card));
    return card.missing.length === 0 ? EXIT.complete : EXIT.missing;
  } catch (error) {
    // What a person can put right: a file that is not there, a table that is not one.
    if (!(error instanceof RangeError) && !isMissingFile(error)) throw error;
    throw new UsageFault(error.message);
  }
}

function isMissingFile(error: unknown): error is NodeJS.ErrnoException {
  return error instanceof Error && 'code' in error && (error.code === 'ENOENT' || error.code === 'EISDIR');
}
