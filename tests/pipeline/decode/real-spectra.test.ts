import { readFileSync } from 'node:fs';
import { gunzipSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { median } from '../../../pipeline/core/quantile.ts';
import {
  bytesInMemory,
  DEFAULT_READ_LIMITS,
  openInput,
  readSpectra,
  readTargets,
  recogniseLayout,
} from '../../../pipeline/decode/index.ts';
import { InputFault } from '../../../pipeline/errors.ts';
import { printSkipReason, sharedPath } from '../../support/shared-data.ts';

const folder = sharedPath('data', 'real');
if (folder === null) printSkipReason('the folder of real spectra');

interface TruthRow {
  readonly file: string;
  readonly select: string;
  readonly snrPerPixel: number | null;
  readonly raDeg: number | null;
  readonly group: string;
}

const SAMPLES_PER_GROUP = 4;
/** Median S/N per pixel of the truth table counts other pixels as good than this reader: masks differ. */
const SNR_FACTOR = 1.4;
/** The truth table estimates the noise of spectra without errors from neighbouring pixels, which read low. */
const SNR_FACTOR_ESTIMATED = 3;

function truthRows(path: string): TruthRow[] {
  const lines = readFileSync(path, 'utf8').trim().split('\n').slice(1);
  return lines.map((line) => {
    const cells = line.split(',');
    const number = (at: number): number | null => (cells[at] === '' ? null : Number(cells[at]));
    return {
      file: cells[0]!,
      select: cells[1]!,
      snrPerPixel: number(6),
      raDeg: number(7),
      group: cells[9]!,
    };
  });
}

/** The first few rows of each group, and every row of files that hold several spectra. */
function sampled(rows: readonly TruthRow[]): TruthRow[] {
  const seen = new Map<string, number>();
  return rows.filter(({ group, select }) => {
    const count = (seen.get(group) ?? 0) + 1;
    seen.set(group, count);
    return count <= SAMPLES_PER_GROUP || select !== '';
  });
}

function open(file: string) {
  const stored = readFileSync(`${folder!}/${file}`);
  const bytes = file.endsWith('.gz') ? gunzipSync(stored) : stored;
  const input = openInput(bytesInMemory(file, new Uint8Array(bytes)), DEFAULT_READ_LIMITS);
  return { input, layout: recogniseLayout(input) };
}

const rows = folder === null ? [] : sampled(truthRows(`${folder}/truth.csv`));

describe.skipIf(folder === null)('real spectra, without a profile', () => {
  it.each(rows)('$file $select is found and read with the S/N it has', (truth) => {
    const { input, layout } = open(truth.file);
    const names = readTargets(input, layout, 0, layout.rowCount).map(({ name }) => name);
    const row = truth.select === '' ? 0 : names.indexOf(truth.select);
    expect(row).toBeGreaterThanOrEqual(0);
    const spectrum = readSpectra(input, layout, row, 1)[0]!;
    if (spectrum instanceof InputFault) {
      // The truth table has no S/N exactly for the spectra that carry no weight anywhere.
      expect(truth.snrPerPixel).toBeNull();
      expect(spectrum.code).toBe('no-usable-pixels');
      return;
    }
    const signal = spectrum.arms.flatMap(({ flux, inverseVariance }) =>
      [...flux].map((value, i) => (inverseVariance[i]! > 0 ? value * Math.sqrt(inverseVariance[i]!) : NaN)),
    );
    const isEstimated = spectrum.arms[0]!.noiseSource === 'estimated';
    const factor = isEstimated ? SNR_FACTOR_ESTIMATED : SNR_FACTOR;
    if (truth.snrPerPixel !== null && truth.snrPerPixel > 0.2) {
      const ratio = median(signal) / truth.snrPerPixel;
      expect(ratio).toBeGreaterThan(1 / factor);
      expect(ratio).toBeLessThan(factor);
    }
    const first = spectrum.arms[0]!.wavelengthVacuumAngstrom[0]!;
    const last = spectrum.arms.at(-1)!.wavelengthVacuumAngstrom.at(-1)!;
    expect(first).toBeGreaterThan(3500);
    expect(first).toBeLessThan(4500);
    expect(last).toBeGreaterThan(8500);
    expect(last).toBeLessThan(10_500);
    if (spectrum.raDeg !== null && truth.raDeg !== null) expect(spectrum.raDeg).toBeCloseTo(truth.raDeg, 2);
  });
});
