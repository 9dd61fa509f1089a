import { describe, expect, it } from 'vitest';
import type { Case, ReasonWord } from '../../../pipeline/weigh/index.ts';
import { reasonsFor } from '../../../pipeline/weigh/reasons/index.ts';
import { aCase, someLine, someMeasurement } from './a-case.ts';

const SURE = 0.99;
const UNSURE = 0.4;
const LINE = 0.9;

function words(one: Case, confidence: number): ReasonWord[] {
  return reasonsFor(one, confidence, LINE).map((reason) => reason.word);
}

/** For each reason: a case where it must fire, and the nearest case where it must not. */
const PAIRS: readonly [ReasonWord, Case, number, Case, number][] = [
  [
    'no-light',
    aCase({
      signalToNoisePerAngstrom: 0.1,
      lines: [],
      posterior: { hypotheses: [], probabilityNone: 0.9, byKind: { galaxy: 0.1, quasar: 0, star: 0 } },
    }),
    UNSURE,
    aCase({ signalToNoisePerAngstrom: 0.1, lines: [someLine('Hα', 8)] }),
    UNSURE,
  ],
  ['faint', aCase({ signalToNoisePerAngstrom: 1 }), UNSURE, aCase({ signalToNoisePerAngstrom: 1 }), SURE],
  ['rival', aCase({ margin: 4 }), SURE, aCase({ margin: 40 }), SURE],
  [
    'lone-line',
    aCase({ lines: [someLine('[O II] 3728', 8)], margin: 65 }),
    SURE,
    aCase({ lines: [someLine('[O II] 3728', 8)], margin: 300 }),
    SURE,
  ],
  [
    'methods-disagree',
    aCase({ secondOpinion: { redshift: 0.8, r: 7, heightAtAnswer: 0.2, rAtAnswer: 2 } }),
    UNSURE,
    aCase({ secondOpinion: { redshift: 0.3002, r: 7, heightAtAnswer: 0.2, rAtAnswer: 2 } }),
    UNSURE,
  ],
  ['poor-fit', aCase({ reducedChiSquare: 4 }), SURE, aCase({ reducedChiSquare: 1.4 }), SURE],
  [
    'gaps',
    aCase({ lines: [someLine('Hβ', 5)] }),
    UNSURE,
    aCase({
      lines: ['[O II] 3728', 'Ca II K', 'Ca II H', 'Hβ', '[O III] 5008', 'Hα'].map((name) =>
        someLine(name, 5),
      ),
    }),
    UNSURE,
  ],
  [
    'range-edge',
    aCase({
      best: { best: { ...someMeasurement('galaxy', 2, 600), atEdge: true }, cost: 617, probability: 1 },
    }),
    SURE,
    aCase(),
    SURE,
  ],
  [
    'sky-line',
    aCase({ lines: [someLine('[O II] 3728', 12, 5579.5)] }),
    SURE,
    aCase({ lines: [someLine('[O II] 3728', 12, 5579.5), someLine('[O III] 5008', 11, 7495)] }),
    SURE,
  ],
  [
    'impossible-lines',
    aCase({ lines: [someLine('[O III] 5008', 10, 6511, 10), someLine('[O III] 4960', 30, 6448, 30)] }),
    SURE,
    aCase({ lines: [someLine('[O III] 5008', 300, 6511, 300), someLine('[O III] 4960', 120, 6448, 120)] }),
    SURE,
  ],
  [
    'unusual',
    aCase({ reducedChiSquare: 8, signalToNoisePerAngstrom: 30 }),
    SURE,
    aCase({ reducedChiSquare: 8, signalToNoisePerAngstrom: 4 }),
    SURE,
  ],
  ['wrong-noise', aCase({ noiseFactor: 1.6 }), SURE, aCase({ noiseFactor: 1.1 }), SURE],
  ['frame-unknown', aCase({ frame: 'unknown' }), SURE, aCase({ frame: 'topocentric' }), SURE],
  ['too-sharp', aCase({ lineSpreadSigmaKmS: 8 }), SURE, aCase({ lineSpreadSigmaKmS: 60 }), SURE],
];

describe('reasonsFor()', () => {
  it.each(PAIRS)('gives %s where it must', (word, fires, confidence) => {
    expect(words(fires, confidence)).toContain(word);
  });

  it.each(PAIRS)('does not give %s in the nearest case without it', (word, _fires, _c, quiet, confidence) => {
    expect(words(quiet, confidence)).not.toContain(word);
  });

  it('has nothing to say about a bright secure galaxy', () => {
    expect(words(aCase(), SURE)).toEqual([]);
  });

  it('puts blocking reasons first and notes last, and every sentence carries a number where there is one', () => {
    const one = aCase({ signalToNoisePerAngstrom: 0.1, lines: [], noiseFactor: 2, reducedChiSquare: 4 });
    const reasons = reasonsFor({ ...one, posterior: { ...one.posterior, probabilityNone: 1 } }, UNSURE, LINE);
    expect(reasons[0]!.weight).toBe('blocks');
    expect(reasons.at(-1)!.weight).toBe('note');
    for (const reason of reasons) expect(reason.sentence).toMatch(/\d/);
  });
});
