import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { toLineList } from '../../../templates/physics/line-list.ts';
import { assembleLines } from '../../../templates/physics/tables.ts';
import { listedToVacuum } from '../../../templates/physics/refraction.ts';
import { starNamed } from '../../../templates/stars/parameters.ts';
import { surfaceSpectrum } from '../../../templates/stars/synthesize-star.ts';
import type { SurfaceSpectrum } from '../../../templates/stars/synthesize-star.ts';
import { printSkipReason, sharedPath } from '../../support/shared-data.ts';
import { BUNDLED_TABLES, BUNDLED_TEXTS } from '../physics/bundled-tables.ts';

/** Iron, calcium and sodium lines of a list small enough to stand here: wavelength, number, ion, energy, log gf (NIST). */
const FEW_LINES = `wave,Z,ion,energy,loggf
5889.951,11,0,0.000,0.117
5895.924,11,0,0.000,-0.184
6162.173,20,0,1.899,-0.090
`;
const RED = { pixelKmS: 3, depths: 32, startAngstrom: 5800, endAngstrom: 6700 };

const LIST = sharedPath('design', 'checks', 'lines_lite.csv');
const WIDTHS = sharedPath('design', 'checks', 'solar_ew_mmh1966.csv');
const absent = LIST === null || WIDTHS === null;
if (absent) {
  printSkipReason('the list of atomic lines or of solar equivalent widths');
}

/** Equivalent width in milliangstrom within `half` angstrom of a listed wavelength, continuum = greatest flux in there. */
function equivalentWidth({ grid, flux }: SurfaceSpectrum, listed: number, half: number): number {
  const centre = listedToVacuum(listed);
  const first = Math.round((Math.log(centre - half) - grid.lnStart) / grid.step);
  const last = Math.round((Math.log(centre + half) - grid.lnStart) / grid.step);
  const window = flux.subarray(first, last + 1);
  const continuum = window.reduce((most, value) => Math.max(most, value), 0);
  return window.reduce((sum, value) => sum + (1 - value / continuum), 0) * grid.step * centre * 1000;
}

describe('surfaceSpectrum', () => {
  const lines = {
    atoms: assembleLines(FEW_LINES, BUNDLED_TEXTS).atoms,
    molecules: toLineList([]),
  };

  it('gives the Sun the flux of its effective temperature at 6100 A within 10 per cent', () => {
    const { grid, flux } = surfaceSpectrum(starNamed('dwarf 5777 4.5 +0.0'), BUNDLED_TABLES, lines, RED);
    const pixel = Math.round((Math.log(6100) - grid.lnStart) / grid.step);
    // Neckel & Labs 1984: mean disc intensity of the continuum at 6100 A, 2.92e6 erg/s/cm2/sr/A, times pi.
    expect(Math.abs(flux[pixel]! / (Math.PI * 2.92e6) - 1)).toBeLessThan(0.1);
  });

  it('strengthens H alpha from the Sun to A stars, and Na D from A stars to the Sun and cool stars', () => {
    const [hot, sun, cool] = ['dwarf 9000 4.2 +0.0', 'dwarf 5777 4.5 +0.0', 'dwarf 4500 4.5 +0.0'].map(
      (name) => surfaceSpectrum(starNamed(name), BUNDLED_TABLES, lines, RED),
    ) as [SurfaceSpectrum, SurfaceSpectrum, SurfaceSpectrum];
    expect(equivalentWidth(hot, 6562.8, 60)).toBeGreaterThan(2 * equivalentWidth(sun, 6562.8, 60));
    expect(equivalentWidth(cool, 5889.95, 2)).toBeGreaterThan(equivalentWidth(sun, 5889.95, 2));
    expect(equivalentWidth(sun, 5889.95, 2)).toBeGreaterThan(3 * equivalentWidth(hot, 5889.95, 2));
  });
});

describe('the synthetic Sun', () => {
  it.skipIf(absent)(
    'has the equivalent widths of Moore, Minnaert & Houtgast 1966: median ratio 0.75-1.35',
    () => {
      const all = assembleLines(readFileSync(LIST!, 'utf8'), BUNDLED_TEXTS);
      const range = { pixelKmS: 2, depths: 40, startAngstrom: 5150, endAngstrom: 6700 };
      const sun = surfaceSpectrum(starNamed('dwarf 5777 4.5 +0.0'), BUNDLED_TABLES, all, range);
      const ratios: number[] = [];
      for (const row of readFileSync(WIDTHS!, 'utf8').split('\n').slice(1)) {
        const [wavelength, , width] = row.split(',').map(Number);
        // Weak and crowded lines, and those with wings wider than the window, do not compare.
        if (wavelength && width && wavelength > 5200 && wavelength < 6650 && width > 80 && width < 300) {
          ratios.push(equivalentWidth(sun, wavelength, 0.45) / width);
        }
      }
      ratios.sort((a, b) => a - b);
      const median = ratios[ratios.length >> 1]!;
      console.info(`solar equivalent widths: ${ratios.length} lines, median ratio ${median.toFixed(2)}`);
      expect(ratios.length).toBeGreaterThan(20);
      // Disc centre there, whole disc here; no hyperfine structure; widths of neighbours in the window.
      expect(median).toBeGreaterThan(0.75);
      expect(median).toBeLessThan(1.35);
    },
  );
});
