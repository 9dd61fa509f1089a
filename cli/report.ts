import type { Command } from 'commander';
import { InvalidArgumentError } from 'commander';

/** Exit status of wrong usage, and of a night that is not complete (documented in the README). */
const WRONG_USAGE = 2;
const NOT_COMPLETE = 1;

interface ReportOptions {
  readonly workspace: string;
  readonly plots?: number;
}

/** Adds `shiftwork report NIGHT`: writes or rewrites the report and the catalogues of a night in the store. */
export function registerReport(program: Command): void {
  program
    .command('report')
    .description('write or rewrite the report and the catalogues of a night')
    .argument('<night>', 'name of the night')
    .option(
      '--workspace <directory>',
      'where the store is',
      process.env['SHIFTWORK_WORKSPACE'] ?? './shiftwork',
    )
    .option('--plots <count>', 'most plots embedded in the report', wholeNumber)
    .addHelpText('after', '\nExample:\n  shiftwork report 2031-04-02\n')
    .action(async (night: string, options: ReportOptions) => {
      await writeReport(program, night, options);
    });
}

async function writeReport(program: Command, night: string, options: ReportOptions): Promise<void> {
  // Loaded here: `shiftwork --help` must not wait for a database driver.
  const [{ nightReader, openSqliteStore }, { PLOT_LIMITS, writeNightOutputs }, { workspaceAt }] =
    await Promise.all([
      import('../store/index.ts'),
      import('../report/index.ts'),
      import('../worker/workspace.ts'),
    ]);
  const workspace = workspaceAt(options.workspace);
  const store = await openSqliteStore(workspace.store, { readOnly: true });
  try {
    if ((await store.night(night)) === null) {
      const known = (await store.nights()).map(({ name }) => name).join(', ');
      program.error(
        `night must be one of the store, got ${night}. Nights here: ${known === '' ? 'none yet' : known}`,
        { exitCode: WRONG_USAGE },
      );
    }
    const reader = await nightReader(store, night);
    const limits = { ...PLOT_LIMITS, ...(options.plots === undefined ? {} : { plots: options.plots }) };
    const { files } = await writeNightOutputs(reader, workspace.night(night), limits);
    console.log(files.join('\n'));
    if (reader.rows().length < reader.facts().expected) process.exitCode = NOT_COMPLETE;
  } finally {
    await store.close();
  }
}

function wholeNumber(text: string): number {
  if (!/^\d+$/.test(text)) throw new InvalidArgumentError('must be a whole number, 0 or more');
  return Number(text);
}
