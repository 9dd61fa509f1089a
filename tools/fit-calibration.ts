/**
 * Fits the calibration of the confidence and writes pipeline/weigh/calibration-values.ts:
 *
 *   npx tsx tools/fit-calibration.ts EXAMPLES.jsonl --id NAME
 *
 * EXAMPLES: one JSON object per line, {"kind", "features", "right", "weight"?}: the kind answered, the features
 * stored with the answer, whether it was right, and how often the example counts. Prints what five-fold
 * cross-validation says of the fit before writing it: Brier score and reliability in five bins.
 */
import { readFileSync, writeFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { parseArgs } from 'node:util';
import { type Calibration, calibrated } from '../pipeline/weigh/calibration.ts';
import { fitLogistic } from '../pipeline/weigh/fit-logistic.ts';
import { KINDS, type Kind } from '../templates/family.ts';

interface Example {
  readonly kind: Kind;
  readonly features: Readonly<Record<string, number>>;
  readonly right: boolean;
}

/**
 * What the confidence of each kind may depend on: few, because the wrong answers to learn from are few, and none
 * whose weight came out with a sign that makes no sense.
 */
const USED: Readonly<Record<Kind, readonly string[]>> = {
  galaxy: ['lnMargin', 'lnReducedChiSquare', 'correlationAgrees', 'restsOnOneLine'],
  quasar: ['lnMargin', 'lnReducedChiSquare', 'correlationAgrees', 'lnStrongestLine'],
  star: ['lnMargin', 'lnMarginOverNone', 'lnReducedChiSquare', 'correlationR'],
};
/** Prior width of a weight of about 1.4: features are of order one. */
const RIDGE = 0.5;
const FOLDS = 5;

function fit(examples: readonly Example[], id: string): Calibration {
  const kindFit = (kind: Kind) => {
    const own = examples.filter((one) => one.kind === kind);
    const names = USED[kind];
    const rows = own.map((one) => ({
      features: names.map((name) => one.features[name] ?? 0),
      target: one.right ? 1 : 0,
    }));
    const { constant, weights } = fitLogistic(rows, RIDGE);
    return { constant, weights: Object.fromEntries(names.map((name, k) => [name, weights[k]!])) };
  };
  return { id, kinds: { galaxy: kindFit('galaxy'), quasar: kindFit('quasar'), star: kindFit('star') } };
}

const { values, positionals } = parseArgs({ allowPositionals: true, options: { id: { type: 'string' } } });
const [path] = positionals;
if (path === undefined || values.id === undefined)
  throw new Error('EXAMPLES.jsonl and --id NAME must be given');
const examples = readFileSync(path, 'utf8')
  .split('\n')
  .filter((line) => line !== '')
  .map((line) => JSON.parse(line) as Example);

const held: { kind: Kind; p: number; right: boolean }[] = [];
for (let fold = 0; fold < FOLDS; fold++) {
  const calibration = fit(
    examples.filter((_, i) => i % FOLDS !== fold),
    'fold',
  );
  examples.forEach((one, i) => {
    if (i % FOLDS !== fold) return;
    held.push({ kind: one.kind, p: calibrated(calibration, one.kind, one.features), right: one.right });
  });
}
for (const kind of KINDS) {
  const own = held.filter((one) => one.kind === kind);
  const brier = own.reduce((sum, { p, right }) => sum + (p - (right ? 1 : 0)) ** 2, 0) / own.length;
  console.log(`${kind}: ${own.length} examples, Brier score ${brier.toFixed(4)} (held out)`);
  for (const [from, to] of [
    [0, 0.2],
    [0.2, 0.5],
    [0.5, 0.8],
    [0.8, 0.95],
    [0.95, 0.99],
    [0.99, 1.01],
  ] as const) {
    const bin = own.filter(({ p }) => p >= from && p < to);
    if (bin.length === 0) continue;
    const said = bin.reduce((sum, { p }) => sum + p, 0) / bin.length;
    const right = bin.filter((one) => one.right).length;
    console.log(
      `  said ${said.toFixed(3)}  right ${(right / bin.length).toFixed(3)}  (${right} of ${bin.length})`,
    );
  }
}

const target = fileURLToPath(new URL('../pipeline/weigh/calibration-values.ts', import.meta.url));
const rounded = JSON.stringify(
  fit(examples, values.id),
  (_, value: unknown) => (typeof value === 'number' ? Number(value.toPrecision(5)) : value),
  2,
);
writeFileSync(
  target,
  `import type { Calibration } from './calibration.ts';

/**
 * Written by tools/fit-calibration.ts; docs/quality.md says from which examples. Never edited by hand.
 */
export const CALIBRATION: Calibration = ${rounded};
`,
);
console.log(`wrote ${target}: run the formatter over it`);
