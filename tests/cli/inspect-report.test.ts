import { describe, expect, it } from 'vitest';
import { inspectInput, inspectLines } from '../../cli/inspect-report.ts';
import { bytesInMemory, DEFAULT_READ_LIMITS, openInput } from '../../pipeline/decode/index.ts';
import { encodeFits } from '../../pipeline/encode/index.ts';

const PIXELS = 300;

function inspectBytes(label: string, bytes: Uint8Array) {
  return inspectInput(openInput(bytesInMemory(label, bytes), DEFAULT_READ_LIMITS));
}

/** A table with a row per pixel: flux, inverse variance and wavelength in nanometres, units stated. */
function tableWithUnits(): Uint8Array {
  const range = Array.from({ length: PIXELS }, (_, i) => i);
  return encodeFits([
    {
      type: 'table',
      rowCount: PIXELS,
      columns: [
        { name: 'wave', type: 'float64', unit: 'nm', values: range.map((i) => 400 + 0.1 * i) },
        {
          name: 'flux',
          type: 'float32',
          unit: '10**-17 erg s-1 cm-2 Angstrom-1',
          values: range.map((i) => 5 + (i % 7)),
        },
        { name: 'ivar', type: 'float32', values: range.map(() => 4) },
      ],
    },
  ]);
}

describe('inspectInput()', () => {
  it('says what was recognised, from which columns, and the range it covers', () => {
    const report = inspectBytes('pixels.fits', tableWithUnits());
    expect(report.fault).toBeNull();
    expect(report.layout).toMatchObject({ form: 'table-row-per-pixel', rowCount: 1 });
    const text = inspectLines(report).join('\n');
    expect(text).toContain("flux from 'flux'");
    expect(text).toMatch(/inverse-variance from 'ivar'/);
    // 400.0 to 429.9 nm; the frame of the numbers (vacuum or air) must be said, whichever was taken.
    expect(text).toMatch(/400[0-9]?(\.\d+)?.*4[23]\d\d/);
    expect(text).toMatch(/vacuum|air/);
  });

  it('names what is missing', () => {
    const text = inspectLines(inspectBytes('pixels.fits', tableWithUnits())).join('\n');
    expect(text).toMatch(/frame.*not stated/);
  });

  it('says why, with the remedy, when there is no spectrum in the file', () => {
    const bytes = encodeFits([{ type: 'image', axes: [] }]);
    const report = inspectBytes('empty.fits', bytes);
    expect(report.layout).toBeNull();
    expect(inspectLines(report).join('\n')).toMatch(/not readable: .*layout-unknown/);
  });

  it('is one JSON document: what it says can be read by a program', () => {
    const report = inspectBytes('pixels.fits', tableWithUnits());
    expect(JSON.parse(JSON.stringify(report))).toMatchObject({
      file: 'pixels.fits',
      kind: 'fits',
      fault: null,
    });
  });
});
