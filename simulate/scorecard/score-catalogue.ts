import { KINDS } from '../../templates/family.ts';
import { type Share, shareOf } from './binomial.ts';
import type { ScoredRow } from './catalogue-table.ts';
import { joined } from './join.ts';
import { type Judgement, judge } from './judge.ts';
import { limitsWith, type RightLimits } from './limits.ts';
import { type Reliability, reliabilityOf } from './reliability.ts';
import { type Tally, tally } from './tally.ts';
import type { TruthRow } from './truth-table.ts';

/** A catalogue held against the truth. */
export interface Scorecard {
  /** All objects together, then by kind, by group and kind, and by signal-to-noise. */
  readonly all: Tally;
  readonly byKind: readonly Tally[];
  readonly byGroup: readonly Tally[];
  readonly bySignal: readonly Tally[];
  /** Of spectra with nothing to be found, those that carry an answer nothing warns of. */
  readonly emptyAccepted: Share;
  /** Of the confidence, over all judged rows; where there is nothing to be found it never comes true. */
  readonly reliability: Reliability;
  /** Truth rows that have no catalogue row: file and target or row. */
  readonly missing: readonly string[];
  /** Rows whose reference is unsure or unknown: not judged. */
  readonly notJudged: number;
}

/** Bounds of the strata of signal-to-noise per ångström. */
const SIGNAL_BOUNDS = [1, 2, 5, 10, 30] as const;
const RELIABILITY_BINS = 10;

/** Holds a catalogue against the truth. Pure; rows and truth in any order. */
export function scoreCatalogue(
  rows: readonly ScoredRow[],
  truth: readonly TruthRow[],
  limits: RightLimits = limitsWith(''),
): Scorecard {
  const pairs = joined(rows, truth);
  const judgements = pairs.flatMap((pair) => judge(pair, limits) ?? []);
  const objects = judgements.filter(({ kind }) => kind !== 'none');
  const empty = judgements.filter(({ kind }) => kind === 'none');
  const missing = pairs.filter(({ answer }) => answer === null);
  const forecasts = judgements.flatMap(({ answer, isRight }) =>
    answer.confidence === null ? [] : [{ probability: answer.confidence, cameTrue: isRight }],
  );
  return {
    all: tally('all', objects),
    byKind: tallies(objects, KINDS, ({ kind }) => kind),
    byGroup: tallies(objects, sortedNames(objects.map(groupAndKind)), groupAndKind),
    bySignal: tallies(objects, SIGNAL_NAMES, signalStratum),
    emptyAccepted: shareOf(empty.filter(({ isAccepted }) => isAccepted).length, empty.length),
    reliability: reliabilityOf(forecasts, RELIABILITY_BINS),
    missing: missing.map(({ truth: { file, row, select } }) =>
      [file, row === null ? '' : `row ${row}`, select].filter((part) => part !== '').join(' '),
    ),
    notJudged: pairs.length - missing.length - judgements.length,
  };
}

const SIGNAL_NAMES = [
  ...SIGNAL_BOUNDS.map((bound, i) => (i === 0 ? `S/N < ${bound}` : `S/N ${SIGNAL_BOUNDS[i - 1]!}-${bound}`)),
  `S/N > ${SIGNAL_BOUNDS.at(-1)!}`,
  'S/N unknown',
];

function signalStratum({ answer: { signalToNoise } }: Judgement): string {
  if (signalToNoise === null) return SIGNAL_NAMES.at(-1)!;
  return SIGNAL_NAMES[SIGNAL_BOUNDS.filter((bound) => signalToNoise >= bound).length]!;
}

function groupAndKind({ group, kind }: Judgement): string {
  return group === '' ? kind : `${group} ${kind}`;
}

function sortedNames(names: readonly string[]): string[] {
  return [...new Set(names)].sort((a, b) => (a < b ? -1 : 1));
}

/** One tally per name that has members, in the order of the names. */
function tallies(
  judgements: readonly Judgement[],
  names: readonly string[],
  nameOf: (judgement: Judgement) => string,
): Tally[] {
  return names
    .map((name) =>
      tally(
        name,
        judgements.filter((judgement) => nameOf(judgement) === name),
      ),
    )
    .filter(({ count }) => count > 0);
}
