import { expect, it } from 'vitest';
import { seededRandom } from '../../../pipeline/core/random.ts';
import { nebularLines } from '../../../simulate/sources/nebula.ts';

const LIGHT_SPEED_KM_S = 299_792.458;
/** Rest wavelengths by the compilation of the NIST Atomic Spectra Database, vacuum ångström. */
const LINES = { o2blue: 3727.092, o2red: 3729.875, o3weak: 4960.295, o3strong: 5008.24, hBeta: 4862.683 };
/** Two parts of a line are at most this far from it. */
const NEAR_KM_S = 200;

const draws = Array.from({ length: 300 }, (_, seed) => nebularLines(seededRandom(seed), () => 1));

function fluxOf(lines: (typeof draws)[number], wavelength: number): { flux: number; velocityKmS: number } {
  const velocity = (at: number): number => (at / wavelength - 1) * LIGHT_SPEED_KM_S;
  const parts = lines.filter((line) => Math.abs(velocity(line.wavelength)) < NEAR_KM_S);
  const flux = parts.reduce((sum, part) => sum + part.flux, 0);
  const moment = parts.reduce((sum, part) => sum + part.flux * velocity(part.wavelength), 0);
  return { flux, velocityKmS: moment / flux };
}

it('[O III] 5007/4959 is 2.98 in every draw (Storey & Zeippen 2000)', () => {
  for (const lines of draws) {
    expect(fluxOf(lines, LINES.o3strong).flux / fluxOf(lines, LINES.o3weak).flux).toBeCloseTo(2.98, 9);
  }
});

it('however the gas moves, the mean velocity of a line is that of the galaxy', () => {
  const offsets = draws.map((lines) => Math.abs(fluxOf(lines, LINES.hBeta).velocityKmS));
  // Rest wavelengths are rounded at 1e-3 Å, 0.06 km/s.
  expect(Math.max(...offsets)).toBeLessThan(0.1);
});

it('the density-sensitive ratio of [O II] stays between its limits, 0.35 and 1.5 (Osterbrock & Ferland 2006)', () => {
  for (const lines of draws) {
    // The pair lies 224 km/s apart: parts of one may reach the other, so only single-peaked draws can tell.
    if (lines.filter(({ wavelength }) => wavelength > 3720 && wavelength < 3735).length !== 2) continue;
    const ratio = fluxOf(lines, LINES.o2red).flux / fluxOf(lines, LINES.o2blue).flux;
    expect(ratio).toBeGreaterThan(0.35);
    expect(ratio).toBeLessThan(1.5);
  }
});
