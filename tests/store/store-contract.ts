import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { InputRecord, Outcome, PlannedSpectrum, Store } from '../../store/index.ts';
import { fabricatedAnswer } from './fabricated-outcome.ts';

const RECIPE = 'a'.repeat(64);
const OTHER_RECIPE = 'b'.repeat(64);
const NIGHT = '2031-04-02';
const AT = '2031-04-02T12:00:00.000Z';

const INPUT: InputRecord = {
  id: 'input-1',
  night: NIGHT,
  path: '/data/one.fits',
  root: '/data',
  relativePath: 'one.fits',
  sizeBytes: 2 ** 40,
  modifiedMs: 1_933_000_000_000.25,
  inode: '18446744073709551615',
  sha256: 'c'.repeat(64),
  layout: null,
  fault: null,
  exposureKey: 'exposure 7',
};

const TARGET = {
  ...{ name: 'field star 4', raDeg: 150.25, decDeg: -2.5, fibre: 17, role: 'calibration' as const },
  ...{ targetClass: 'flux standard', magnitude: 16.5, magnitudeBand: 'r' },
};

const SPECTRA: readonly PlannedSpectrum[] = [2, 10, 1].map((row, ordinal) => ({
  spectrumId: `${NIGHT}/one#1.${row}`,
  inputId: INPUT.id,
  ordinal,
  hdu: 1,
  row,
  target: row === 10 ? TARGET : null,
}));

const outcome = (index: number, changes: Partial<Outcome> = {}): Outcome => ({
  spectrumId: SPECTRA[index]!.spectrumId,
  inputSha256: INPUT.sha256,
  facts: null,
  result: { answer: fabricatedAnswer(), curves: null },
  ...changes,
});

/**
 * What every backend must promise. Run it over a backend by giving a way to open an empty store.
 */
export function storeContract(backend: string, open: () => Promise<Store>): void {
  describe(`a store on ${backend}`, () => {
    let store: Store;
    beforeEach(async () => {
      store = await open();
      await store.saveNight({ name: NIGHT, settings: { measuring: { gridStepLn: 2e-4 } } });
      await store.savePlan(INPUT, SPECTRA);
      await store.startRun({
        ...{ runId: 'run-1', night: NIGHT, recipeHash: RECIPE, startedAt: AT, finishedAt: null },
        ...{ stageMs: {}, spectraMeasured: 0, provenance: { version: '0' } },
      });
    });
    afterEach(() => store.close());

    const save = (outcomes: readonly Outcome[], recipe = RECIPE) =>
      store.saveOutcomes(outcomes, recipe, 'run-1', AT);

    it('gives an input back as it was, 64-bit numbers included', async () => {
      expect(await store.input(INPUT.id)).toEqual(INPUT);
    });

    it('knows every expected spectrum before anything is measured, in code-unit order', async () => {
      const pending = await store.pending(NIGHT, RECIPE);
      expect(pending.map(({ spectrumId }) => spectrumId)).toEqual([
        `${NIGHT}/one#1.1`,
        `${NIGHT}/one#1.10`,
        `${NIGHT}/one#1.2`,
      ]);
      expect(await store.counts(NIGHT)).toEqual({ expected: 3, done: 0, faults: 0, needsReview: 0 });
    });

    it('knows a spectrum that nobody can read by the target the plan named', async () => {
      const fault = { word: 'unreadable', code: 'no-usable-pixels', detail: 'none' } as const;
      await save([outcome(1, { result: { fault } })]);
      expect(await store.rows(NIGHT)).toMatchObject([
        {
          ...{ target_name: 'field star 4', ra: 150.25, dec: -2.5, fibre: 17, role: 'calibration' },
          ...{ target_class: 'flux standard', magnitude: 16.5, magnitude_band: 'r' },
          ...{ reasons: 'unreadable', redshift: null },
        },
      ]);
    });

    it('takes a spectrum off the pending list when its row is written, and only under that recipe', async () => {
      await save([outcome(0)]);
      expect(await store.pending(NIGHT, RECIPE)).toHaveLength(2);
      expect(await store.pending(NIGHT, OTHER_RECIPE)).toHaveLength(3);
    });

    it('changes nothing when a chunk is written twice', async () => {
      await save([outcome(0), outcome(1)]);
      const once = await store.rows(NIGHT);
      await save([outcome(0), outcome(1)]);
      expect(await store.rows(NIGHT)).toEqual(once);
    });

    it('gives every number of an answer back bit for bit', async () => {
      await save([outcome(0)]);
      const [row] = await store.rows(NIGHT);
      expect(row).toMatchObject({
        ...{ kind: 'galaxy', redshift: 0.123456789, redshift_error: 1.5e-5, chi_square: 1234.5 },
        ...{ needs_review: false, reasons: '', lines_detected: 6, barycentric_correction_km_s: -12.5 },
        ...{ settled_redshift: 0.123456789, settled_by: 'program', input_hdu: 1, input_row: 2 },
      });
    });

    it('turns NaN and infinities into missing at the border', async () => {
      const answer = fabricatedAnswer({
        redshift: Number.NaN,
        chiSquare: Infinity,
        features: { x: -Infinity },
      });
      await save([outcome(0, { result: { answer, curves: null } })]);
      const [row] = await store.rows(NIGHT);
      expect(row).toMatchObject({ redshift: null, chi_square: null });
    });

    it('leaves nothing of a chunk behind when one of its rows cannot be written', async () => {
      const unwritable = outcome(1, { spectrumId: null as unknown as string });
      await expect(save([outcome(0), unwritable])).rejects.toThrow();
      expect((await store.counts(NIGHT)).done).toBe(0);
    });

    it('keeps a fault as a row that asks for a person and says why', async () => {
      const fault = { word: 'unreadable', code: 'fits-truncated', detail: 'one.fits: too short' } as const;
      await save([outcome(0, { result: { fault } })]);
      const [row] = await store.rows(NIGHT);
      expect(row).toMatchObject({
        reasons: 'unreadable',
        needs_review: true,
        kind: null,
        settled_redshift: null,
      });
      const details = await store.details(NIGHT);
      expect(details.get(row!.spectrum_id)!().reasons[0]!.sentence).toBe('one.fits: too short');
      expect(await store.spectraWithFault(NIGHT, ['fits-truncated'])).toHaveLength(1);
    });

    it('wants a spectrum measured again when its file has other bytes now', async () => {
      await save([outcome(0), outcome(1), outcome(2)]);
      await store.savePlan({ ...INPUT, sha256: 'd'.repeat(64) }, SPECTRA);
      expect(await store.pending(NIGHT, RECIPE)).toHaveLength(3);
    });

    it('wants a requeued spectrum once: its next row takes it off the list', async () => {
      await save([outcome(0)]);
      expect(await store.requeue([SPECTRA[0]!.spectrumId, 'nobody knows this'], AT)).toBe(1);
      expect(await store.pendingIn([{ inputId: INPUT.id, first: 0, count: 1 }], RECIPE)).toHaveLength(1);
      await save([outcome(0)]);
      expect(await store.pendingIn([{ inputId: INPUT.id, first: 0, count: 1 }], RECIPE)).toHaveLength(0);
    });

    it('adds the reasons of the night job to a row and asks for a look', async () => {
      await save([outcome(0)]);
      const reason = { word: 'repeat-clash', weight: 'look', sentence: 'clash', numbers: {} } as const;
      const finding = { spectrumId: SPECTRA[0]!.spectrumId, reason };
      await store.saveNightFindings(NIGHT, RECIPE, [finding], []);
      await store.saveNightFindings(NIGHT, RECIPE, [finding], []);
      const [row] = await store.rows(NIGHT);
      expect(row).toMatchObject({ reasons: 'repeat-clash', needs_review: true, settled_redshift: null });
    });

    it('lets the last verdict settle a spectrum and keeps the earlier ones', async () => {
      await save([outcome(0)]);
      const verdict = {
        ...({
          spectrumId: SPECTRA[0]!.spectrumId,
          kind: null,
          certainty: 'sure',
          at: AT,
          remark: null,
        } as const),
        reviewer: 'somebody',
      };
      await store.addVerdict({ ...verdict, verdict: 'no-redshift', redshift: null });
      await store.addVerdict({ ...verdict, verdict: 'set-redshift', redshift: 0.5 });
      const [row] = await store.rows(NIGHT);
      expect(row).toMatchObject({ settled_redshift: 0.5, settled_by: 'reviewer', verdict: 'set-redshift' });
    });

    it('sums stage times over chunks and reports them per spectrum', async () => {
      await store.addStageTimes('run-1', { grid: 10, match: 20 }, 1);
      await store.addStageTimes('run-1', { grid: 30 }, 3);
      expect((await store.facts(NIGHT)).stageMs).toEqual({ grid: 10, match: 5 });
    });
  });
}
