/**
 * `npm start`: makes a practice night of the invented Larkfield survey with known truth, measures it,
 * and says how many answers are right. A night that is there already is kept, and so is every row that is
 * current; `npm start -- --again` measures anew.
 */
import { spawnSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import { dirname, join, relative } from 'node:path';
import { fileURLToPath } from 'node:url';
import { parseArgs } from 'node:util';

const ROOT = dirname(dirname(fileURLToPath(import.meta.url)));
const COMMAND = join(ROOT, 'dist/cli/main.js');

/** The date is part of the practice survey: `shiftwork simulate` names its nights from it. */
const NIGHT = '2031-04-02';
/** Eighty fibres, three exposures: 240 spectra, measured in about three minutes on two cores. */
const FIBRES = '80';
const PRACTICE = join(ROOT, 'larkfield');
const WORKSPACE = join(ROOT, 'shiftwork');
const RESULTS = join(WORKSPACE, 'nights', NIGHT);

const { values } = parseArgs({ options: { again: { type: 'boolean', default: false } } });

if (!existsSync(join(PRACTICE, 'truth.csv'))) {
  say('making a practice night in larkfield/, with its truth kept apart');
  shiftwork('simulate', '--out', PRACTICE, '--fibres', FIBRES);
}
shiftwork(
  'run',
  join(PRACTICE, NIGHT),
  ...['--night', NIGHT, '--workspace', WORKSPACE],
  ...(values.again ? ['--again'] : []),
);
shiftwork('scorecard', join(RESULTS, 'catalogue.csv'), join(PRACTICE, 'truth.csv'));
say(`report: ${relative(process.cwd(), join(RESULTS, 'report.html'))}`);

function shiftwork(...parameters) {
  const child = spawnSync(process.execPath, [COMMAND, ...parameters], { cwd: ROOT, stdio: 'inherit' });
  if (child.status !== 0) process.exit(child.status ?? 1);
}

function say(what) {
  console.log(`start: ${what}`);
}
