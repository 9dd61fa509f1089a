import { describe, expect, it } from 'vitest';
import { airToVacuum, vacuumToAir } from '../../../../pipeline/decode/wavelength/air-vacuum.ts';

/** Vacuum, air (ångström): Ciddor (1996) evaluated in double precision by an independent Python program. */
const PAIRS = [
  [2500, 2499.2465251],
  [3728.815, 3727.754831],
  [4862.691, 4861.3329768],
  [5891.583253, 5889.9508558],
  [6564.632, 6562.8190214],
  [10000, 9997.2590902],
  [25000, 24993.1802203],
] as const;

describe('vacuumToAir', () => {
  it.each(PAIRS)('takes %d Å in vacuum to the air value of Ciddor (1996) within 1e-6 Å', (vacuum, air) => {
    expect(Math.abs(vacuumToAir(vacuum) - air)).toBeLessThan(1e-6);
  });

  it('agrees with worked values of two public programs to their last digit', () => {
    expect(vacuumToAir(2000)).toBeCloseTo(1999.353, 3);
    expect(airToVacuum(4861.363)).toBeCloseTo(4862.721, 3);
    expect(airToVacuum(6056.125)).toBeCloseTo(6057.8019, 4);
  });

  it('leaves wavelengths below 2,000 Å alone', () => {
    expect(vacuumToAir(1215.67)).toBe(1215.67);
    expect(airToVacuum(1215.67)).toBe(1215.67);
  });
});

describe('airToVacuum', () => {
  it('undoes vacuumToAir within 1e-9 Å from 2,000 to 25,000 Å', () => {
    for (let vacuum = 2000; vacuum <= 25_000; vacuum += 37.3) {
      expect(Math.abs(airToVacuum(vacuumToAir(vacuum)) - vacuum)).toBeLessThan(1e-9);
    }
  });
});
