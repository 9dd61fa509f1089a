import { expect, it } from 'vitest';
import {
  limitsWith,
  readTruth,
  scoreCatalogue,
  scorecardText,
  type ScoredRow,
} from '../../../simulate/scorecard/index.ts';

const LIGHT_SPEED_KM_S = 299_792.458;

const row = (changes: Partial<ScoredRow>): ScoredRow => ({
  spectrumId: '',
  inputFile: 'exposure-01.fits',
  inputRow: 0,
  targetName: '',
  kind: 'galaxy',
  redshift: 0,
  redshiftError: 1e-4,
  confidence: 0.9,
  needsReview: false,
  signalToNoise: 10,
  ...changes,
});

/** A redshift that is off by so many km/s in c Δz / (1 + z). */
const off = (redshift: number, kmS: number): number => redshift + ((1 + redshift) * kmS) / LIGHT_SPEED_KM_S;

const truthOf = (...lines: string[]) => readTruth(['file,row,kind,redshift,group', ...lines].join('\n'));

it.each([
  ['galaxy', 0.5, 299, true],
  ['galaxy', 0.5, -301, false],
  ['star', 0.0005, 99, true],
  ['star', 0.0005, 101, false],
  ['quasar', 2, -1499, true],
  ['quasar', 2, 1501, false],
] as const)('a %s at redshift %f off by %i km/s is right: %s', (kind, redshift, kmS, isRight) => {
  const { all } = scoreCatalogue(
    [row({ kind, redshift: off(redshift, kmS) })],
    truthOf(`night/exposure-01.fits,0,${kind},${redshift},`),
  );
  expect(all.right.count).toBe(isRight ? 1 : 0);
});

it('limits can be set by kind, and by group and kind', () => {
  const limits = limitsWith('star=150, faint/galaxy=600');
  expect([
    limits('', 'star'),
    limits('faint', 'star'),
    limits('faint', 'galaxy'),
    limits('other', 'galaxy'),
  ]).toEqual([150, 150, 600, 300]);
  expect(() => limitsWith('galaxies=3')).toThrow(RangeError);
  expect(() => limitsWith('galaxy=0')).toThrow(RangeError);
});

it('counts right, wrong, flagged and accepted, and takes offsets and pulls from the right ones only', () => {
  const rows = [
    row({ inputRow: 0, redshift: off(0.1, 10) }),
    row({ inputRow: 1, redshift: off(0.1, 30) }),
    row({ inputRow: 2, redshift: off(0.1, 20), needsReview: true }),
    row({ inputRow: 3, redshift: 0.9 }),
    row({ inputRow: 4, redshift: null, redshiftError: null, needsReview: true }),
  ];
  const { all } = scoreCatalogue(
    rows,
    truthOf(...rows.map((_, r) => `exposure-01.fits,${r},galaxy,0.1,bright`)),
  );
  expect({ ...all, right: all.right.count, accepted: all.accepted.count }).toMatchObject({
    count: 5,
    right: 3,
    wrong: 2,
    flagged: 2,
    accepted: 3,
    wrongAmongAccepted: { count: 1, of: 3 },
  });
  expect(all.offsetKmS).toBeCloseTo(20, 9);
  // An error of 1e-4 is 29.98 km/s there before division by 1.1.
  expect(all.pullMedian).toBeCloseTo(20 / ((1e-4 * LIGHT_SPEED_KM_S) / 1.1), 9);
});

it('a truth path and a catalogue path meet when one is the end of the other, never by name alone', () => {
  const rows = [
    row({ inputFile: 'a/spectrum.fits', inputRow: null, redshift: 0.1 }),
    row({ inputFile: 'ba/spectrum.fits', inputRow: null, redshift: 0.2 }),
  ];
  const { all, missing } = scoreCatalogue(
    rows,
    readTruth('file,kind,redshift\nreal/ba/spectrum.fits,galaxy,0.2\nc/spectrum.fits,galaxy,0.1\n'),
  );
  expect(all.right).toMatchObject({ count: 1, of: 1 });
  expect(missing).toEqual(['c/spectrum.fits']);
});

it('rows of a stack are found by target name when the truth selects by it', () => {
  const rows = [
    row({ inputRow: 0, targetName: '39', redshift: 0.5 }),
    row({ inputRow: 1, targetName: '40', redshift: 0.1 }),
  ];
  const { all } = scoreCatalogue(
    rows,
    readTruth('file,select,kind,redshift\nexposure-01.fits,40,galaxy,0.1\n'),
  );
  expect(all.right.count).toBe(1);
});

it('unsure and unknown references are not judged; spectra without an object count what was accepted', () => {
  const rows = [0, 1, 2, 3].map((inputRow) => row({ inputRow, needsReview: inputRow === 3 }));
  const card = scoreCatalogue(
    rows,
    readTruth(
      [
        'file,row,kind,redshift,reference_trust',
        'exposure-01.fits,0,galaxy,0,doubtful',
        'exposure-01.fits,1,,,unknown',
        'exposure-01.fits,2,none,,sure',
        'exposure-01.fits,3,none,,sure',
      ].join('\n'),
    ),
  );
  expect(card.notJudged).toBe(2);
  expect(card.all.count).toBe(0);
  expect(card.emptyAccepted).toMatchObject({ count: 1, of: 2 });
  // Confidence 0.9 twice in spectra with nothing to be right about.
  expect(card.reliability.brierScore).toBeCloseTo(0.81, 12);
});

it('strata of signal-to-noise hold every object once, lower bounds included', () => {
  const signals = [0.5, 1, 4.9, 5, 200, null];
  const { bySignal } = scoreCatalogue(
    signals.map((signalToNoise, inputRow) => row({ inputRow, signalToNoise })),
    truthOf(...signals.map((_, r) => `exposure-01.fits,${r},galaxy,0,`)),
  );
  expect(bySignal.map(({ name, count }) => [name, count])).toEqual([
    ['S/N < 1', 1],
    ['S/N 1-2', 1],
    ['S/N 2-5', 1],
    ['S/N 5-10', 1],
    ['S/N > 30', 1],
    ['S/N unknown', 1],
  ]);
});

it('a truth table without its columns or with an unknown kind is refused', () => {
  expect(() => readTruth('name,kind\na,star\n')).toThrow('column file');
  expect(() => readTruth('file,redshift\na,1\n')).toThrow('column kind');
  expect(() => readTruth('file,kind\na,nebula\n')).toThrow('nebula');
});

it('the printed card names what is missing and stays within 120 columns', () => {
  const names = Array.from({ length: 12 }, (_, r) => `gone.fits,${r},star,0.001,halo-star`);
  const text = scorecardText(
    scoreCatalogue([row({})], truthOf('exposure-01.fits,0,galaxy,0,bright-galaxy', ...names)),
  );
  expect(text).toContain('in the truth but not in the catalogue: 12');
  expect(text).toContain('  gone.fits row 9\n  and 2 more');
  expect(Math.max(...text.split('\n').map((line) => line.length))).toBeLessThanOrEqual(120);
});
