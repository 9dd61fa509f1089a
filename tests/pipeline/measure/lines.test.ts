import { describe, expect, it } from 'vitest';
import { measureLines } from '../../../pipeline/measure/lines.ts';
import type { Refit } from '../../../pipeline/measure/refit.ts';
import { refitPixels } from '../../../pipeline/measure/refit-pixels.ts';

const LINE_SPREAD_KM_S = 65;
const SPEED_OF_LIGHT_KM_S = 299_792.458;

/** A flat continuum of 1 with one Gaussian line of given peak at an observed wavelength, noise sigma 0.1. */
function withLine(observedAngstrom: number, peak: number, sigmaKmS: number) {
  const length = 4000;
  const wavelengthVacuumAngstrom = Float64Array.from({ length }, (_, i) => 3700 + 1.3 * i);
  const sigma = (sigmaKmS / SPEED_OF_LIGHT_KM_S) * observedAngstrom;
  const flux = wavelengthVacuumAngstrom.map(
    (w) => 1 + peak * Math.exp(-0.5 * ((w - observedAngstrom) / sigma) ** 2),
  );
  const inverseVariance = new Float64Array(length).fill(100);
  return {
    pixels: refitPixels(
      [{ wavelengthVacuumAngstrom, flux, inverseVariance, level: new Float64Array(length) }],
      0,
    ),
    area: peak * sigma * Math.sqrt(2 * Math.PI),
  };
}

function flatRefit(redshift: number, count: number, fluxScale: number): Refit {
  const one = new Float64Array(count).fill(1 / fluxScale);
  return { redshift, chiSquare: 0, price: 0, active: [], activeIndices: [], model: one, continuum: one };
}

describe('measureLines()', () => {
  it('returns the flux of a line of the assumed width within 1 per cent, and its equivalent width at rest', () => {
    const z = 0.3;
    const width = Math.hypot(80, LINE_SPREAD_KM_S);
    const { pixels, area } = withLine(5008.2396 * (1 + z), 2, width);
    const lines = measureLines(
      pixels,
      flatRefit(z, pixels.count, pixels.fluxScale),
      'galaxy',
      LINE_SPREAD_KM_S,
      1,
    );
    const found = lines.find((line) => line.name === '[O III] 5008')!;
    expect(found.flux / area).toBeCloseTo(1, 2);
    expect(found.equivalentWidthAngstrom! / (area / (1 + z))).toBeCloseTo(1, 1);
    expect(found.signalToNoise).toBeGreaterThan(20);
  });

  it('finds nothing significant where there is no line', () => {
    const { pixels } = withLine(6000, 0, 100);
    const lines = measureLines(
      pixels,
      flatRefit(0.1, pixels.count, pixels.fluxScale),
      'galaxy',
      LINE_SPREAD_KM_S,
      1,
    );
    expect(lines.length).toBeGreaterThan(5);
    for (const line of lines) expect(Math.abs(line.signalToNoise)).toBeLessThan(0.5);
  });

  it('sees Lyα of a distant galaxy, so that an answer resting on it alone can be told', () => {
    const z = 2.4;
    const { pixels } = withLine(1215.67 * (1 + z), 3, Math.hypot(80, LINE_SPREAD_KM_S));
    const lines = measureLines(
      pixels,
      flatRefit(z, pixels.count, pixels.fluxScale),
      'galaxy',
      LINE_SPREAD_KM_S,
      1,
    );
    expect(lines.find((line) => line.name === 'Lyα')!.signalToNoise).toBeGreaterThan(10);
  });

  it('divides the significance by the root of the noise inflation', () => {
    const z = 0.3;
    const { pixels } = withLine(5008.2396 * (1 + z), 1, 103);
    const refit = flatRefit(z, pixels.count, pixels.fluxScale);
    const of = (inflation: number): number =>
      measureLines(pixels, refit, 'galaxy', LINE_SPREAD_KM_S, inflation).find(
        (l) => l.name === '[O III] 5008',
      )!.signalToNoise;
    expect(of(1) / of(2)).toBeCloseTo(Math.SQRT2, 9);
  });

  it('leaves out lines that fall on no data', () => {
    const { pixels } = withLine(6000, 1, 100);
    const lines = measureLines(
      pixels,
      flatRefit(0.9, pixels.count, pixels.fluxScale),
      'galaxy',
      LINE_SPREAD_KM_S,
      1,
    );
    expect(lines.some((line) => line.name === 'Hα')).toBe(false);
  });
});
