import type { Share } from './binomial.ts';
import type { Scorecard } from './score-catalogue.ts';
import type { Tally } from './tally.ts';

/** Names of missing spectra printed before the rest is only counted. */
const MOST_NAMES = 10;

const HEADINGS = [
  '',
  'N',
  'right',
  '95 %',
  'kind',
  'flagged',
  'accepted',
  'wrong',
  '95 %',
  'offset',
  'scatter',
  'pull',
];

/** A scorecard as plain text, for a terminal of 120 columns. */
export function scorecardText(card: Scorecard): string {
  const sections: [string, readonly Tally[]][] = [
    ['by kind', card.byKind],
    ['by group', card.byGroup],
    ['by signal-to-noise per ångström', card.bySignal],
  ];
  const table = [
    HEADINGS,
    tallyCells(card.all),
    ...sections.flatMap(([title, tallies]) => [[title], ...tallies.map(tallyCells)]),
  ];
  return [
    ...aligned(table),
    '',
    'right: within the limit of its kind; accepted: nothing asks for a person; wrong: among the accepted;',
    'offset, scatter: median and robust sigma of the right ones, km/s; pull: robust sigma of offset over error',
    ...besideLines(card.byKind),
    `spectra without an object: ${card.emptyAccepted.count} of ${card.emptyAccepted.of} accepted`,
    ...missingLines(card),
    '',
    ...reliabilityLines(card),
    '',
  ].join('\n');
}

function tallyCells(each: Tally): string[] {
  return [
    `  ${each.name}`,
    String(each.count),
    percent(each.right),
    interval(each.right),
    percent(each.rightKind),
    String(each.flagged),
    String(each.accepted.count),
    `${each.wrongAmongAccepted.count} (${percent(each.wrongAmongAccepted)})`,
    interval(each.wrongAmongAccepted),
    decimal(each.offsetKmS, 1),
    decimal(each.scatterKmS, 1),
    decimal(each.pullSigma, 2),
  ];
}

function besideLines(tallies: readonly Tally[]): string[] {
  const beside: Readonly<Record<string, string>> = {
    star: 'stars within max(30 km/s, 5 errors)',
    quasar: 'quasars within 3,000 km/s',
  };
  return tallies.flatMap(({ name, rightBeside }) => {
    const what = beside[name];
    return what === undefined ? [] : [`${what}: ${percent(rightBeside)}`];
  });
}

function missingLines({ missing, notJudged }: Scorecard): string[] {
  const named = missing.slice(0, MOST_NAMES).map((name) => `  ${name}`);
  const rest = missing.length - named.length;
  return [
    `not judged, reference unsure or unknown: ${notJudged}`,
    `in the truth but not in the catalogue: ${missing.length}`,
    ...named,
    ...(rest > 0 ? [`  and ${rest} more`] : []),
  ];
}

function reliabilityLines({ reliability }: Scorecard): string[] {
  const { brierScore, expectedCalibrationError, bins } = reliability;
  const rows = bins.map(({ from, to, stated, cameTrue }) => [
    `  ${from.toFixed(1)}-${to.toFixed(1)}`,
    String(cameTrue.of),
    decimal(stated, 3),
    decimal(cameTrue.value, 3),
    cameTrue.of === 0 ? '' : `${cameTrue.low.toFixed(3)}-${cameTrue.high.toFixed(3)}`,
  ]);
  return [
    `confidence: Brier score ${decimal(brierScore, 4)}, calibration error ${decimal(expectedCalibrationError, 4)}`,
    ...aligned([['  confidence', 'N', 'stated', 'right', '95 %'], ...rows]),
  ];
}

function percent({ value }: Share): string {
  return value === null ? '-' : `${(100 * value).toFixed(1)} %`;
}

function interval({ of, low, high }: Share): string {
  return of === 0 ? '' : `${(100 * low).toFixed(0)}-${(100 * high).toFixed(0)}`;
}

function decimal(value: number | null, digits: number): string {
  return value === null ? '-' : value.toFixed(digits);
}

/** Pads cells so that columns stand under each other: the first to the left, others to the right. */
function aligned(table: readonly (readonly string[])[]): string[] {
  const columns = Math.max(...table.map((row) => row.length));
  const widths = Array.from({ length: columns }, (_, c) =>
    Math.max(...table.filter((row) => row.length > 1).map((row) => (row[c] ?? '').length)),
  );
  return table.map((row) =>
    row
      .map((cell, c) => (c === 0 ? cell.padEnd(widths[0]!) : cell.padStart(widths[c]!)))
      .join('  ')
      .trimEnd(),
  );
}
