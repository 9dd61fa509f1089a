import { describe, expect, it } from 'vitest';
import { unpack } from '../../../report/client/unpack.ts';
import { LANDMARK_LINES } from '../../../report/spectrum/landmark-lines.ts';
import { lineMarks } from '../../../report/spectrum/line-marks.ts';
import { packSpectrum } from '../../../report/spectrum/pack.ts';
import { quantise } from '../../../report/spectrum/quantise.ts';
import { thinIndexes } from '../../../report/spectrum/thin.ts';
import { emptyRow, fabricatedDetail, measuredRow, seeded } from '../fabricated-night.ts';

const ROW = measuredRow(9, seeded(3));
const DETAIL = fabricatedDetail(ROW);

describe('thinIndexes()', () => {
  it('keeps everything when it fits', () => {
    expect([...thinIndexes([3, 1, 2], 3)]).toEqual([0, 1, 2]);
  });

  it('keeps at most the limit, ascending, and never loses the highest or the lowest sample', () => {
    const random = seeded(5);
    for (let trial = 0; trial < 50; trial++) {
      const values = Float32Array.from({ length: 500 + Math.floor(3_000 * random()) }, () => random());
      values[Math.floor(values.length * random())] = 9;
      values[Math.floor(values.length * random())] = -9;
      const kept = thinIndexes(values, 300);
      expect(kept.length).toBeLessThanOrEqual(300);
      expect([...kept]).toEqual([...new Set(kept)].sort((a, b) => a - b));
      const keptValues = Array.from(kept, (i) => values[i]!);
      expect(Math.max(...keptValues)).toBe(Math.max(...values));
      expect(Math.min(...keptValues)).toBe(Math.min(...values));
    }
  });

  it('chooses among preferred samples where a bin has any', () => {
    const values = [0, 50, 1, 2, 7, 60];
    expect([...thinIndexes(values, 2, [1, 0, 1, 1, 1, 0])]).toEqual([0, 4]);
    expect([...thinIndexes(values, 2, [0, 0, 0, 0, 0, 0])]).toEqual([0, 5]);
  });

  it('takes a stretch without any number', () => {
    expect(thinIndexes(new Float32Array(100).fill(NaN), 10).length).toBeLessThanOrEqual(10);
  });

  it('refuses a limit below two', () => {
    expect(() => thinIndexes([1, 2, 3], 1)).toThrow(RangeError);
  });
});

describe('quantise()', () => {
  it('is not spoilt by one cosmic ray: the range stays near the rest', () => {
    const values = Float32Array.from({ length: 1_000 }, (_, i) => Math.sin(i));
    values[500] = 1e6;
    // Central spread of a sine is just below 2; 20 spreads on each side.
    expect(quantise(values, 4095, true).range.to).toBeLessThan(45);
    expect(quantise(values, 4095, false).range.to).toBe(1e6);
  });

  it('takes constant, empty and not-finite series', () => {
    expect(quantise([2, 2], 10, true).range).toMatchObject({ from: 2, to: 2 });
    expect(quantise([], 10, true).bytes.length).toBe(0);
    expect(quantise([NaN, Infinity], 10, true).range).toMatchObject({ from: 0, to: 0 });
  });
});

describe('packSpectrum() and unpack()', () => {
  it('bring curves into the page within one step of their range, missing samples as missing', async () => {
    const payload = packSpectrum(ROW, DETAIL)!;
    // Through JSON, as the page gets it.
    const { arms, scan } = await unpack(JSON.parse(JSON.stringify(payload)) as typeof payload);
    const source = DETAIL.curves!.arms[1]!;
    const arm = arms[1]!;
    expect(arm.wavelength.length).toBe(1_200);
    const indexOf = new Map(
      Array.from(source.wavelengthVacuumAngstrom, (value, i) => [Math.round(value), i]),
    );
    const step = (source.wavelengthVacuumAngstrom.at(-1)! - source.wavelengthVacuumAngstrom[0]!) / 65_534;
    const fluxStep = (payload.arms[1]!.flux.to - payload.arms[1]!.flux.from) / 4_095;
    let compared = 0;
    arm.wavelength.forEach((value, k) => {
      const i = indexOf.get(Math.round(value));
      if (i === undefined || Math.abs(source.wavelengthVacuumAngstrom[i]! - value) > step) return;
      if (source.used[i] === 0) return;
      const difference = Math.abs(arm.flux[k]! - source.flux[i]!);
      // Pixels are about 1 A apart, so rounding can hit the neighbour; those are told apart by the step above.
      expect(difference).toBeLessThanOrEqual(fluxStep);
      compared++;
    });
    expect(compared).toBeGreaterThan(1_000);
    expect(scan.map(({ kind }) => kind)).toEqual(['galaxy', 'quasar', 'star']);
    expect(Math.min(...scan[0]!.chiSquare.map(Number))).toBeLessThan(4_140);
  });

  it('hand missing samples on as missing', async () => {
    const curves = DETAIL.curves!;
    const arm = curves.arms[0]!;
    const short = {
      ...arm,
      wavelengthVacuumAngstrom: Float32Array.of(4000, 4001, 4002),
      flux: Float32Array.of(1, NaN, 3),
      error: Float32Array.of(0.1, 0.1, Infinity),
      model: Float32Array.of(1, 2, 3),
      runnerUpModel: new Float32Array(0),
      used: Uint8Array.of(1, 0, 1),
    };
    const payload = packSpectrum(ROW, { ...DETAIL, curves: { arms: [short], scan: [] } })!;
    const [read] = (await unpack(payload)).arms;
    expect(read!.flux).toEqual([1, null, 3]);
    expect(read!.error[2]).toBeNull();
    expect(read!.runnerUp).toBeNull();
    expect(read!.payload.masked).toEqual([[4000.5, 4001.5]]);
  });

  it('say that there is nothing to draw when no curves were kept', () => {
    expect(packSpectrum(ROW, { ...DETAIL, curves: null })).toBeNull();
    expect(packSpectrum(ROW, { ...DETAIL, curves: { arms: [], scan: [] } })).toBeNull();
  });

  it('stay below 25 kB for two arms of 2,250 and 3,900 pixels, so that 750 fit into 20 MB', () => {
    expect(JSON.stringify(packSpectrum(ROW, DETAIL)).length).toBeLessThan(25_000);
  });
});

describe('lineMarks()', () => {
  const galaxy = {
    ...emptyRow('a'),
    kind: 'galaxy' as const,
    redshift: 0.1,
    runner_up_kind: 'quasar' as const,
    runner_up_redshift: 1.5,
  };

  it('puts H alpha of a galaxy at z = 0.1 at 7221.1 and Mg II of a quasar at z = 1.5 at 6997.8 ångström', () => {
    const marks = lineMarks(galaxy, 3600, 9800);
    // 6564.61 · 1.1 and 2799.12 · 2.5
    expect(marks.find(({ label }) => label === 'Hα')).toEqual({
      label: 'Hα',
      wavelength: 7221.07,
      of: 'best',
    });
    expect(marks.find(({ of, label }) => of === 'runner-up' && label === 'Mg II')?.wavelength).toBe(6997.8);
  });

  it('goes back to the frame of the data when the correction was added here', () => {
    const moved = { ...galaxy, barycentric_source: 'applied-here', barycentric_correction_km_s: 29.9792458 };
    const mark = lineMarks(moved, 3600, 9800).find(({ label }) => label === 'Hα')!;
    // 1e-4 of c: 7221.071 / 1.0001
    expect(mark.wavelength).toBe(7220.35);
    const already = { ...moved, barycentric_source: 'already-applied' };
    expect(lineMarks(already, 3600, 9800).find(({ label }) => label === 'Hα')!.wavelength).toBe(7221.07);
  });

  it('leaves out what the data do not cover, and everything when there is no answer', () => {
    expect(lineMarks(galaxy, 8000, 8100)).toEqual([]);
    expect(lineMarks(emptyRow('a'), 3600, 9800)).toEqual([]);
  });
});

describe('LANDMARK_LINES', () => {
  it('agree with published vacuum wavelengths (NIST levels; Morton 2003) within 0.02 ångström', () => {
    const published = [
      ['Lyα', 1215.67],
      ['[Ne III]', 3869.861],
      ['Ca K', 3934.777],
      ['Ca H', 3969.592],
      ['Hβ', 4862.683],
      ['Hα', 6564.608],
    ] as const;
    for (const [label, wavelength] of published) {
      const line = LANDMARK_LINES.find((one) => one.label === label)!;
      expect(Math.abs(line.wavelength - wavelength)).toBeLessThan(0.02);
    }
  });
});
