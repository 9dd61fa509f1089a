import { describe, expect, it } from 'vitest';
import { buildAtmosphere, convectiveShare } from '../../../templates/physics/atmosphere.ts';
import { compose } from '../../../templates/physics/composition.ts';
import { BOLTZMANN } from '../../../templates/physics/constants.ts';
import { continuumOpacity } from '../../../templates/physics/continuum.ts';
import { interpolateClamped } from '../../../templates/physics/interpolate.ts';
import { BUNDLED_TABLES } from './bundled-tables.ts';

const SOLAR = compose(BUNDLED_TABLES.elements, 0, 0, 0);
const build = (effectiveTemperature: number, logGravity: number) =>
  buildAtmosphere(
    { effectiveTemperature, logGravity, metallicity: 0, composition: SOLAR, depths: 48 },
    BUNDLED_TABLES,
  );
const sun = build(5777, 4.44);
const { gas } = sun.continuum;

describe('buildAtmosphere', () => {
  // Gray 2005, table 9.2 (solar model): tau_5000 = 2/3 has T = 6390 K, log P = 5.07, log Pe = 1.77.
  // The depth scale here is Rosseland, and blanketing is schematic: 100 K, 0.15 and 0.2 dex.
  it('gives the Sun its published temperature and pressures at optical depth 2/3', () => {
    const at = (values: Float64Array): number => interpolateClamped(sun.tau, values, 2 / 3);
    expect(Math.abs(at(gas.temperature) - 6390)).toBeLessThan(100);
    expect(Math.abs(Math.log10(at(gas.pressure)) - 5.07)).toBeLessThan(0.15);
    const electronPressure = gas.electrons.map((n, i) => n * BOLTZMANN * gas.temperature[i]!);
    expect(Math.abs(Math.log10(at(electronPressure)) - 1.77)).toBeLessThan(0.2);
  });

  it('is in hydrostatic equilibrium: dP/dtau = g / kappa within 3 per cent at every inner depth', () => {
    for (let i = 6; i < sun.tau.length - 1; i += 1) {
      const slope =
        (gas.pressure[i + 1]! - gas.pressure[i - 1]!) / Math.log(sun.tau[i + 1]! / sun.tau[i - 1]!);
      const kappa = sun.meanOpacity[i]! / gas.massDensity[i]!;
      const expected = (10 ** 4.44 * sun.tau[i]!) / kappa;
      // Central differences over steps of 0.34 in ln tau, and an opacity interpolated in steps of half a dex.
      expect(Math.abs(slope / expected - 1)).toBeLessThan(0.05);
    }
  });

  it('makes dwarfs denser than giants and the temperature rise inwards', () => {
    const giant = build(4400, 2);
    const dwarf = build(4400, 4.5);
    const middle = 32;
    expect(dwarf.continuum.gas.pressure[middle]).toBeGreaterThan(10 * giant.continuum.gas.pressure[middle]!);
    for (let i = 1; i < 48; i += 1) {
      expect(giant.continuum.gas.temperature[i]).toBeGreaterThanOrEqual(
        giant.continuum.gas.temperature[i - 1]!,
      );
    }
  });
});

describe('convectiveShare', () => {
  it('is full in the Sun and giants, none in A stars, and lasts longer in white dwarfs', () => {
    expect(convectiveShare(5777, 4.44)).toBe(1);
    expect(convectiveShare(4400, 2)).toBe(1);
    expect(convectiveShare(8000, 4.2)).toBe(0);
    expect(convectiveShare(8000, 8)).toBe(1);
    expect(convectiveShare(7100, 4.2)).toBeCloseTo(0.5, 12);
  });
});

describe('continuumOpacity', () => {
  const at = (source: typeof sun.continuum, wavelength: number): Float64Array => {
    const out = new Float64Array(source.gas.length);
    continuumOpacity(source, wavelength, out);
    return out;
  };

  it('jumps at the Balmer limit in an A star and hardly in the Sun', () => {
    const hot = build(9500, 4.2);
    const layer = 30;
    const jump = (source: typeof sun.continuum): number =>
      at(source, 3640)[layer]! / at(source, 4200)[layer]!;
    expect(jump(hot.continuum)).toBeGreaterThan(10);
    expect(jump(sun.continuum)).toBeLessThan(2);
  });

  it('in the Sun has the maximum of H- near 8500 A and its minimum near 16,400 A', () => {
    const layer = 33;
    expect(at(sun.continuum, 8500)[layer]).toBeGreaterThan(at(sun.continuum, 5000)[layer]!);
    expect(at(sun.continuum, 16400)[layer]).toBeLessThan(0.5 * at(sun.continuum, 8500)[layer]!);
  });
});
