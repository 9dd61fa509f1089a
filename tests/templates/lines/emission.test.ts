import { describe, expect, it } from 'vitest';
import { DISTANT_GROUPS, STRONG_GROUPS, WEAK_GROUPS } from '../../../templates/lines/emission-groups.ts';
import { drawLines, errorFunction } from '../../../templates/lines/render.ts';
import { REST_WAVELENGTHS as REST } from '../../../templates/lines/rest-wavelengths.ts';
import { STORED_GRID } from '../../../templates/stars/stored-grid.ts';

const fluxOf = (label: string, wavelength: number): number => {
  const group = [...STRONG_GROUPS, ...WEAK_GROUPS].find((one) => one.label === label);
  return group?.lines.find((line) => line.wavelength === wavelength)?.flux ?? NaN;
};

describe('emission groups', () => {
  it('have the case B Balmer decrement of Storey & Hummer 1995 (10,000 K, 100 cm⁻³) within 0.1 per cent', () => {
    const table: readonly (readonly [number, number])[] = [
      [REST.hydrogenAlpha, 2.8632],
      [REST.hydrogenGamma, 0.4683],
      [REST.hydrogenDelta, 0.2589],
      [REST.hydrogenEpsilon, 0.159],
      [REST.hydrogen8, 0.105],
      [REST.hydrogen9, 0.0731],
      [REST.hydrogen10, 0.053],
    ];
    const beta = fluxOf('balmer', REST.hydrogenBeta);
    for (const [wavelength, ratio] of table) {
      expect(Math.abs(fluxOf('balmer', wavelength) / beta / ratio - 1)).toBeLessThan(1e-3);
    }
  });

  it('redden the dusty Balmer group: Hα/Hβ rises, Hγ/Hβ falls', () => {
    const beta = fluxOf('balmer-dusty', REST.hydrogenBeta);
    // 2.8632 × 10^(0.4 × 2.4 × (1.13526 − 0.821216)), the package's curve at 4861.3 and 6562.8 Å.
    expect(fluxOf('balmer-dusty', REST.hydrogenAlpha) / beta).toBeCloseTo(5.733, 2);
    expect(fluxOf('balmer-dusty', REST.hydrogenGamma) / beta).toBeLessThan(0.4683);
  });

  it('have [O III] 5007/4959 within 2.98 ± 0.03 (Storey & Zeippen 2000) and [N II] 6583/6548 within 3.0 ± 0.1', () => {
    const oxygen = fluxOf('oxygen3', REST.oxygenIII5007) / fluxOf('oxygen3', REST.oxygenIII4959);
    expect(Math.abs(oxygen - 2.98)).toBeLessThan(0.03);
    const nitrogen = fluxOf('nitrogen2', REST.nitrogenII6583) / fluxOf('nitrogen2', REST.nitrogenII6548);
    expect(Math.abs(nitrogen - 3)).toBeLessThan(0.1);
  });

  it('span exactly the ratios atoms allow: [O II] 3729/3726 0.34–1.50, [S II] 6716/6731 0.42–1.48', () => {
    const oxygen = (label: string): number =>
      fluxOf(label, REST.oxygenII3729) / fluxOf(label, REST.oxygenII3726);
    const sulphur = (label: string): number =>
      fluxOf(label, REST.sulphurII6716) / fluxOf(label, REST.sulphurII6731);
    expect(oxygen('oxygen2-dense')).toBeCloseTo(0.34, 12);
    expect(oxygen('oxygen2-sparse')).toBeCloseTo(1.5, 12);
    expect(sulphur('sulphur2-dense')).toBeCloseTo(0.42, 12);
    expect(sulphur('sulphur2-sparse')).toBeCloseTo(1.48, 12);
  });

  it('name every group once, with positive fluxes', () => {
    for (const list of [[...STRONG_GROUPS, ...WEAK_GROUPS], DISTANT_GROUPS]) {
      expect(new Set(list.map(({ label }) => label)).size).toBe(list.length);
      for (const { lines } of list) for (const { flux } of lines) expect(flux).toBeGreaterThan(0);
    }
  });
});

describe('drawLines()', () => {
  const wavelength = REST.oxygenIII5007;

  it.each([20, 85, 400])('keeps flux, centre and width of a line of %f km/s', (sigmaKmS) => {
    const { flux, first, end } = drawLines(STORED_GRID, [{ wavelength, flux: 7 }], sigmaKmS);
    let total = 0;
    let mean = 0;
    let square = 0;
    for (let i = first; i < end; i++) {
      const x = STORED_GRID.lnStart + i * STORED_GRID.step - Math.log(wavelength);
      const energy = flux[i]! * Math.exp(STORED_GRID.lnStart + i * STORED_GRID.step) * STORED_GRID.step;
      total += energy;
      mean += energy * x;
      square += energy * x * x;
    }
    expect(total).toBeCloseTo(7, 4);
    expect(Math.abs(mean / total) * 299_792).toBeLessThan(0.5);
    // Averaging over a pixel adds step²/12 to the variance.
    const expected = Math.sqrt((sigmaKmS / 299_792.458) ** 2 + STORED_GRID.step ** 2 / 12);
    expect(Math.abs(Math.sqrt(square / total) / expected - 1)).toBeLessThan(2e-3);
  });

  it('is zero outside first..end and says 0, 0 for a line off the grid', () => {
    const { flux, first, end } = drawLines(STORED_GRID, [{ wavelength, flux: 1 }], 60);
    expect(flux.every((value, i) => (i >= first && i < end) || value === 0)).toBe(true);
    expect(drawLines(STORED_GRID, [{ wavelength: 20_000, flux: 1 }], 60)).toMatchObject({ first: 0, end: 0 });
  });

  it('errorFunction() is within 1.5e-7 of tabulated values (Abramowitz & Stegun 1964, table 7.1)', () => {
    const table: readonly (readonly [number, number])[] = [
      [0, 0],
      [0.5, 0.5204998778],
      [1, 0.8427007929],
      [2, 0.995322265],
      [-1, -0.8427007929],
    ];
    for (const [x, value] of table) expect(Math.abs(errorFunction(x) - value)).toBeLessThan(1.5e-7);
  });
});
