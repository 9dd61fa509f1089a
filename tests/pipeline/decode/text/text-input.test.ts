import { describe, expect, it } from 'vitest';
import { seededRandom } from '../../../../pipeline/core/random.ts';
import {
  airToVacuum,
  bytesInMemory,
  DEFAULT_READ_LIMITS,
  openInput,
  readSpectra,
  recogniseLayout,
} from '../../../../pipeline/decode/index.ts';
import type { Spectrum } from '../../../../pipeline/decode/index.ts';
import { flagPolarity } from '../../../../pipeline/decode/text/flag-column.ts';
import { parseText } from '../../../../pipeline/decode/text/parse-text.ts';
import { faultOf } from '../../../support/fault-of.ts';

const PLACE = { file: 'made.txt' };
const random = seededRandom(41);
const PIXELS = 300;
const waves = Array.from({ length: PIXELS }, (_, i) => 4500 + 3 * i);
const fluxes = waves.map(() => 5 + random.normal());

function open(text: string) {
  return openInput(bytesInMemory('made.txt', new TextEncoder().encode(text)), DEFAULT_READ_LIMITS);
}

function lines(separator: string, ...columns: (readonly number[])[]): string {
  return waves.map((_, i) => columns.map((column) => String(column[i])).join(separator)).join('\n');
}

function first(text: string): Spectrum {
  const input = open(text);
  return readSpectra(input, recogniseLayout(input), 0, 1)[0] as Spectrum;
}

describe('parseText', () => {
  it.each([
    ['white space, Windows line ends and Fortran exponents', '  4000  1.5D+01\r\n4001\t-2d0 \r\n'],
    ['commas with a header', 'wave,flux\n4000, 15\n4001,-2\n'],
    ['semicolons', '4000;15\n4001; -2'],
    ['comments of several kinds and empty lines', '# a\n; b\n% c\n\n4000 15\n\n4001 -2\n'],
  ])('reads %s', (_, text) => {
    expect(parseText(text, PLACE).columns.map((column) => [...column])).toEqual([
      [4000, 4001],
      [15, -2],
    ]);
  });

  it('takes names and units from a header line, a last comment or ECSV', () => {
    const expected = { names: ['wave', 'flux'], units: ['nm', ''] };
    expect(parseText('wave(nm) flux\n400 1\n', PLACE)).toMatchObject(expected);
    expect(parseText('# made today\n# wave[nm] flux\n400 1\n', PLACE)).toMatchObject(expected);
    const ecsv =
      '# %ECSV 1.0\n# ---\n# datatype:\n# - {name: wave, unit: nm, datatype: float64}\n' +
      '# - {name: flux, datatype: float64}\nwave flux\n400 1\n';
    expect(parseText(ecsv, PLACE)).toMatchObject(expected);
  });

  it('turns words for missing into NaN and keeps empty CSV cells', () => {
    expect([...parseText('4000,nan\n4001,\n4002,null\n', PLACE).columns[1]!]).toEqual([NaN, NaN, NaN]);
  });

  it('names the line that has too few columns or a word among numbers', () => {
    expect(faultOf(() => parseText('1 2\n3\n', PLACE)).message).toContain(
      'line 2 must have 2 columns, got 1',
    );
    expect(faultOf(() => parseText('1 2\n3 x\n', PLACE)).message).toContain(
      "line 2 column 2 must be a number, got 'x'",
    );
    expect(faultOf(() => parseText('# nothing\n', PLACE)).code).toBe('file-empty');
  });
});

describe('flagPolarity', () => {
  it('goes by where pixels without light gather, and else by the rarer value', () => {
    const flux = Float64Array.of(0, 0, 5, 6, 7);
    expect(flagPolarity(Float64Array.of(1, 1, 0, 0, 0), flux).badWhen).toBe('nonzero');
    expect(flagPolarity(Float64Array.of(0, 0, 1, 1, 1), flux).badWhen).toBe('zero');
    const lit = flux.map(() => 3);
    expect(flagPolarity(Float64Array.of(0, 0, 0, 0, 2), lit).badWhen).toBe('nonzero');
    expect(flagPolarity(Float64Array.of(1, 1, 1, 1, 0), lit).badWhen).toBe('zero');
  });
});

describe('a text spectrum', () => {
  it('without names is read by its numbers: wavelength, flux, error and flag', () => {
    const flags = waves.map((_, i) => (i < 20 ? 1 : 0));
    const values = fluxes.map((flux, i) => (i < 20 ? 0 : flux));
    const spectrum = first(
      lines(
        ' ',
        waves,
        values,
        waves.map(() => 1.05),
        flags,
      ),
    );
    const arm = spectrum.arms[0]!;
    expect(arm.noiseSource).toBe('stated');
    expect(arm.inverseVariance[19]).toBe(0);
    expect(arm.inverseVariance[20]).toBeCloseTo(1.05 ** -2, 12);
    expect(arm.wavelengthVacuumAngstrom[0]).toBe(airToVacuum(4500));
  });

  it('says what it assumed: air, and noise from scatter', () => {
    const { missing } = recogniseLayout(open(lines(' ', waves, fluxes)));
    expect(missing.join('; ')).toContain('air assumed');
    expect(missing.join('; ')).toContain('noise will be estimated');
  });

  it('believes a comment about the medium and a frame card', () => {
    const text = `# wavelength in vacuum\n# SPECSYS = BARYCENT\n${lines(' ', waves, fluxes)}`;
    const spectrum = first(text);
    expect(spectrum.arms[0]!.wavelengthVacuumAngstrom[0]).toBe(4500);
    expect(spectrum.frame).toBe('barycentric');
  });

  it('lets a profile overrule the medium, and then no longer calls it missing', () => {
    const input = open(lines(' ', waves, fluxes));
    const layout = recogniseLayout(input, { name: 'ours', medium: 'vacuum' });
    expect(layout.arms[0]!.medium).toBe('vacuum');
    expect(layout.missing.join()).not.toContain('air assumed');
  });

  it('in random order is refused, not sorted in silence', () => {
    const shuffled = [...waves.slice(150), ...waves.slice(0, 150)];
    const input = open(`wave flux\n${lines(' ', shuffled, fluxes)}`);
    expect(readSpectra(input, recogniseLayout(input), 0, 1)[0]).toMatchObject({
      code: 'wavelength-not-monotonic',
    });
  });
});

describe('openInput', () => {
  it('faults empty input, gzip, other binary data and texts over the limit', () => {
    const bytes = (...values: number[]) => bytesInMemory('made', Uint8Array.from(values));
    const open_ = (source: ReturnType<typeof bytes>) => faultOf(() => openInput(source, DEFAULT_READ_LIMITS));
    expect(open_(bytes()).code).toBe('file-empty');
    expect(open_(bytes(0x1f, 0x8b, 8, 0)).message).toContain('gzip');
    expect(open_(bytes(1, 0, 2)).code).toBe('file-kind-unknown');
    const tight = { ...DEFAULT_READ_LIMITS, textBytes: 3 };
    expect(faultOf(() => openInput(bytes(52, 32, 53, 10), tight)).code).toBe('file-too-large');
  });
});
