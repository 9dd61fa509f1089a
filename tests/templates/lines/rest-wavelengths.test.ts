import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { REST_WAVELENGTHS } from '../../../templates/lines/rest-wavelengths.ts';
import { printSkipReason, sharedPath } from '../../support/shared-data.ts';

const table = sharedPath('design', 'checks', 'rest_lines.csv');
if (table === null) printSkipReason('the table of rest wavelengths');

describe('REST_WAVELENGTHS', () => {
  it.skipIf(table === null)('are each within 1 km/s of a line of the compilation (NIST, Morton 2003)', () => {
    const listed = readFileSync(table!, 'utf8')
      .split('\n')
      .slice(1)
      .map((row) => Number(row.split(',')[2]))
      .filter((wavelength) => wavelength > 0);
    for (const wavelength of Object.values(REST_WAVELENGTHS)) {
      const nearest = Math.min(...listed.map((other) => Math.abs(other - wavelength)));
      expect((nearest / wavelength) * 299_792.458).toBeLessThan(1);
    }
  });

  it('ascend', () => {
    const values = Object.values(REST_WAVELENGTHS);
    expect(values).toEqual([...values].sort((a, b) => a - b));
  });
});
