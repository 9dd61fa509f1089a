import { describe, expect, it } from 'vitest';
import { fibreTallies, oddFibres } from '../../../report/night/fibres.ts';
import { outcomeOf } from '../../../report/night/outcome.ts';
import { summarise } from '../../../report/night/summary.ts';
import type { CatalogueRow } from '../../../store/catalogue-row.ts';
import { emptyRow, fabricatedRows, measuredRow, readerOf, seeded } from '../fabricated-night.ts';

const measured = measuredRow(0, seeded(1));
const galaxy = (change: Partial<CatalogueRow>): CatalogueRow => ({
  ...measured,
  needs_review: false,
  reasons: '',
  ...change,
});

describe('outcomeOf()', () => {
  it('accepts what has a redshift and needs no review', () => {
    expect(outcomeOf(galaxy({}))).toBe('accepted');
    expect(outcomeOf(galaxy({ reasons: 'wrong-noise' }))).toBe('accepted');
  });

  it('never accepts a row without a redshift', () => {
    expect(outcomeOf(galaxy({ redshift: null }))).toBe('flagged');
  });

  it('calls unreadable what could not be read, whatever the fibre was for', () => {
    expect(outcomeOf(emptyRow('a'))).toBe('unreadable');
    expect(outcomeOf({ ...emptyRow('a'), role: 'sky' })).toBe('unreadable');
  });

  it('does not judge sky fibres', () => {
    expect(outcomeOf(galaxy({ role: 'sky', needs_review: true, reasons: 'no-light' }))).toBe('sky');
  });
});

describe('summarise()', () => {
  const rows = fabricatedRows();
  const summary = summarise(readerOf(rows, { expected: rows.length + 2 }).facts(), rows);

  it('gives every row exactly one outcome, and names expected spectra without a row', () => {
    const { accepted, flagged, unreadable, sky } = summary.outcomes;
    expect(accepted + flagged + unreadable + sky).toBe(rows.length);
    expect(unreadable).toBe(1);
    expect(summary.missing).toBe(2);
  });

  it('counts every object once by kind and once by class', () => {
    const total = (counts: readonly { counts: Record<string, number> }[]): number =>
      counts.reduce(
        (sum, { counts: one }) => sum + one['accepted']! + one['flagged']! + one['unreadable']!,
        0,
      );
    expect(total(summary.byKind)).toBe(rows.length - summary.outcomes.sky);
    expect(total(summary.byClass)).toBe(rows.length - summary.outcomes.sky);
  });

  it('puts each object with a signal-to-noise in one bin, negative ones in the lowest', () => {
    const few = [0.2, 0.5, 3, 1e6, -2].map((snr) => galaxy({ signal_to_noise_per_angstrom: snr }));
    const bins = summarise(readerOf(few).facts(), few).success;
    expect(bins.map(({ accepted }) => accepted.of)).toEqual([2, 1, 0, 0, 1, 0, 0, 0, 1]);
  });

  it('counts each reason once per spectrum that carries it', () => {
    const few = [galaxy({ reasons: 'rival faint' }), galaxy({ reasons: 'faint' }), galaxy({})];
    expect(summarise(readerOf(few).facts(), few).reasons).toEqual([
      { word: 'faint', count: 2 },
      { word: 'rival', count: 1 },
    ]);
  });

  it('takes a night without any row', () => {
    expect(summarise(readerOf([], { expected: 0 }).facts(), [])).toMatchObject({
      rows: 0,
      missing: 0,
      fibres: [],
      oddFibres: [],
    });
  });
});

describe('oddFibres()', () => {
  /** Ten exposures of 200 fibres; each spectrum fails with a chance of 15 %. */
  const night = (seed: number, dead: number | null): readonly CatalogueRow[] => {
    const random = seeded(seed);
    return Array.from({ length: 2_000 }, (_, i) =>
      galaxy({ fibre: i % 200, needs_review: i % 200 === dead || random() < 0.15 }),
    );
  };

  it('names a fibre that always fails', () => {
    expect(oddFibres(fibreTallies(night(1, 77))).map(({ fibre }) => fibre)).toContain(77);
  });

  it('names anything in at most one of twenty nights in which all fibres are alike', () => {
    const nights = 200;
    let named = 0;
    for (let seed = 1; seed <= nights; seed++) {
      if (oddFibres(fibreTallies(night(seed, null))).length > 0) named++;
    }
    // Expected at most 10; the binomial distribution exceeds 20 once in a thousand such tests.
    expect(named).toBeLessThanOrEqual(20);
  });
});
