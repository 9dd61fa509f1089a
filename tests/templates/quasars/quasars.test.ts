import { beforeAll, describe, expect, it } from 'vitest';
import type { Component } from '../../../templates/family.ts';
import { populationsFromFile, quasarsFromFile } from '../../../templates/prepare/file-contents.ts';
import { meanOver, wavelengthsOf } from '../../../templates/prepare/log-grid.ts';
import { rootMeanSquare } from '../../../templates/prepare/unit-rows.ts';
import { balmerContinuum } from '../../../templates/quasars/balmer-continuum.ts';
import { COMPOSITE_LINES } from '../../../templates/quasars/composite-lines.ts';
import { drawQuasars } from '../../../templates/quasars/draws.ts';
import { QUASAR_GRID, QUASAR_SEARCH_GRID } from '../../../templates/quasars/grid.ts';
import { ironBlend } from '../../../templates/quasars/iron.ts';
import { ironLinesOf } from '../../../templates/quasars/iron-lines.ts';
import { quasarFamilies } from '../../../templates/quasars/quasar-families.ts';
import { installedBytes } from '../installed-files.ts';

describe('COMPOSITE_LINES', () => {
  it('sum to the equivalent widths of the composite (Vanden Berk et al. 2001, table 2) per blend', () => {
    const sum = (from: number, to: number): number =>
      COMPOSITE_LINES.filter(({ centre }) => centre > from && centre < to).reduce(
        (total, { equivalentWidth }) => total + equivalentWidth,
        0,
      );
    // Table values with the share that hand-made bases may add: Lyα 92.91 alone; the others within a quarter.
    expect(sum(1210, 1220)).toBeCloseTo(92.91, 2);
    const published: readonly (readonly [from: number, to: number, width: number])[] = [
      [1390, 1405, 8.13],
      [1535, 1560, 23.78],
      [1850, 1915, 21.19],
      [2790, 2810, 32.28],
      [4330, 4350, 12.62],
      [4855, 4870, 46.21],
      [5000, 5015, 13.23],
      [6550, 6590, 194.52],
    ];
    for (const [from, to, width] of published) {
      expect(Math.abs(sum(from, to) / width - 1), `${from}–${to}`).toBeLessThan(0.26);
    }
  });
});

describe('ironBlend()', () => {
  const list =
    'wave,Z,ion,E,loggf\n2599.4,26,1,0.0,0.4\n2382.0,26,1,0.0,0.5\n4923.9,26,1,2.89,-1.3\n5000,26,0,1,0\n';

  it('shines at its lines, peak 1, nothing far from them', () => {
    const lines = ironLinesOf(list);
    expect(lines.length).toBe(3);
    const blend = ironBlend(lines, QUASAR_SEARCH_GRID);
    expect(Math.max(...blend)).toBeCloseTo(1, 6);
    expect(meanOver(QUASAR_SEARCH_GRID, blend, 2590, 2610)).toBeGreaterThan(0.5);
    expect(meanOver(QUASAR_SEARCH_GRID, blend, 3200, 3300)).toBe(0);
  });

  it('refuses a list without Fe II', () => {
    expect(() => ironLinesOf('wave,Z,ion,E,loggf\n5000,26,0,1,0\n')).toThrow(RangeError);
    expect(() => ironBlend([], QUASAR_SEARCH_GRID)).toThrow(RangeError);
  });
});

describe('balmerContinuum()', () => {
  it('is brightest near the edge, goes on smoothly through merging lines, and fades by 4000 Å', () => {
    const bump = balmerContinuum(QUASAR_SEARCH_GRID);
    const near = meanOver(QUASAR_SEARCH_GRID, bump, 3500, 3640);
    expect(near).toBeCloseTo(1, 1);
    expect(meanOver(QUASAR_SEARCH_GRID, bump, 3660, 3720) / near).toBeGreaterThan(0.5);
    expect(meanOver(QUASAR_SEARCH_GRID, bump, 3660, 3720) / near).toBeLessThan(1.3);
    expect(meanOver(QUASAR_SEARCH_GRID, bump, 4050, 4200)).toBeLessThan(0.3);
    expect(meanOver(QUASAR_SEARCH_GRID, bump, 1500, 1600)).toBeLessThan(0.4);
  });
});

describe('drawQuasars()', () => {
  const DRAWN = 12;

  it('is the same for the same seed, positive, and steep in the blue as the composite is on average', () => {
    // Iron near 2540 Å only, so that it does not enter the slope.
    const iron = Float32Array.from(wavelengthsOf(QUASAR_SEARCH_GRID), (wavelength) =>
      Math.abs(wavelength - 2540) < 60 ? 1 : 0,
    );
    const draws = drawQuasars(QUASAR_SEARCH_GRID, iron, DRAWN, 7);
    const again = drawQuasars(QUASAR_SEARCH_GRID, iron, 2, 7);
    again.forEach((flux, k) => {
      expect(Buffer.from(flux.buffer).equals(Buffer.from(draws[k]!.buffer))).toBe(true);
    });
    const slopes = draws.map((flux) => {
      const blue = meanOver(QUASAR_SEARCH_GRID, flux, 1440, 1470);
      const red = meanOver(QUASAR_SEARCH_GRID, flux, 4180, 4240);
      return Math.log(red / blue) / Math.log(4210 / 1455);
    });
    const mean = slopes.reduce((sum, slope) => sum + slope, 0) / slopes.length;
    // −1.56 with a scatter of 0.35, reddened by 0.1 at a mean E(B−V) of 0.02: three standard errors.
    expect(Math.abs(mean + 1.46)).toBeLessThan((3 * 0.35) / Math.sqrt(DRAWN));
    for (const flux of draws) expect(flux.every((value) => value > 0 && value < Infinity)).toBe(true);
  });
});

describe('quasar families', () => {
  const families = (): ReturnType<typeof quasarFamilies> =>
    quasarFamilies(
      quasarsFromFile(installedBytes('quasars.fits')),
      populationsFromFile(installedBytes('populations.fits')),
      60,
    );
  let all: ReturnType<typeof quasarFamilies>;
  beforeAll(() => {
    all = families();
  });
  const named = (components: readonly Component[], label: string): Component =>
    components.find((component) => component.label === label)!;

  it('cover redshift 0.02 to 7 without a gap, on 700 to 10,600 Å', () => {
    expect(all[0]!.redshiftMin).toBe(0.02);
    expect(all.at(-1)!.redshiftMax).toBe(7);
    all.slice(1).forEach((family, k) => {
      expect(family.redshiftMin).toBe(all[k]!.redshiftMax);
    });
    const wavelengths = wavelengthsOf(QUASAR_GRID);
    expect(wavelengths[0]).toBeLessThanOrEqual(700);
    expect(wavelengths.at(-1)).toBeGreaterThanOrEqual(10_600);
  });

  it('bring companions along: no mixture has Lyα without C IV, nor Mg II without C III]', () => {
    const components = all[0]!.componentsAt(0.5);
    const lymanAlpha = named(components, 'lyman-alpha 1800');
    const magnesium = named(components, 'magnesium2 1800');
    expect(meanOver(QUASAR_GRID, lymanAlpha.flux, 1540, 1555)).toBeGreaterThan(0.02);
    expect(meanOver(QUASAR_GRID, magnesium.flux, 1900, 1913)).toBeGreaterThan(0.1);
  });

  it('dim what is blueward of Lyα with redshift and share what is not', () => {
    const family = all.at(-1)!;
    const near = family.componentsAt(2.5);
    const far = family.componentsAt(5.8);
    const level = (components: readonly Component[]): number =>
      meanOver(QUASAR_GRID, named(components, 'power law -1.2').flux, 1050, 1170);
    // Madau 1995 at rest 1100 Å: 0.82 at redshift 2.5, 0.14 at 5.8; the band is narrower than that changes.
    expect(level(far) / level(near)).toBeLessThan(0.25);
    expect(named(far, 'magnesium2 900').flux).toBe(named(near, 'magnesium2 900').flux);
    expect(family.componentsAt(5.81)).toBe(far);
  });

  it('offer hosts that begin without a step', () => {
    const host = named(all[0]!.componentsAt(0.5), 'host 30m-solar');
    const ratio = meanOver(QUASAR_GRID, host.flux, 1440, 1458) / meanOver(QUASAR_GRID, host.flux, 1463, 1480);
    expect(ratio).toBeGreaterThan(0.9);
    expect(ratio).toBeLessThan(1.2);
  });

  it('search with unit-rms vectors', () => {
    for (const { basis } of all) {
      for (const vector of basis) expect(rootMeanSquare(vector)).toBeCloseTo(1, 5);
    }
  });
});
