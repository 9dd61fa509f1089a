import { describe, expect, it } from 'vitest';
import type { Line } from '../../../templates/physics/line-list.ts';
import { generateBandLines, parseBandSystems } from '../../../templates/physics/molecular-bands.ts';
import { molecularPartition } from '../../../templates/physics/molecular-states.ts';
import { listedToVacuum } from '../../../templates/physics/refraction.ts';
import { BUNDLED_TABLES, BUNDLED_TEXTS } from './bundled-tables.ts';

const systems = parseBandSystems(BUNDLED_TEXTS.bands);

/** Strength per angstrom at 3000 K of lines between two wavelengths. */
function strengthBetween(lines: readonly Line[], from: number, to: number): number {
  let sum = 0;
  for (const line of lines) {
    if (line.wavelength >= from && line.wavelength < to) {
      sum += line.gf * Math.exp((-line.energyEv * 11604.5) / 3000);
    }
  }
  return sum / (to - from);
}

/** Half-width of the strip around a published head in which the strength must rise, angstrom. */
const HEAD_TOLERANCE = 1.5;

/** Strength per angstrom in the strip around a head over that before it (blueward of a head shaded to the red). */
function headContrast(lines: readonly Line[], airAngstrom: number, shadedTo: 'red' | 'violet'): number {
  const head = listedToVacuum(airAngstrom);
  const strip = strengthBetween(lines, head - HEAD_TOLERANCE, head + HEAD_TOLERANCE);
  const before =
    shadedTo === 'red'
      ? strengthBetween(lines, head - 8, head - HEAD_TOLERANCE)
      : strengthBetween(lines, head + HEAD_TOLERANCE, head + 8);
  return strip / before;
}

describe('generateBandLines', () => {
  // Pearse & Gaydon 1976, The identification of molecular spectra (from memory), air angstrom. None of these heads
  // was used to set an origin: those are 0-0 heads of TiO gamma and VO. The last number is the sub-band.
  it.each([
    ['TiO', 'gamma', 6651.5, 'red', 0],
    ['TiO', 'gamma', 6681.1, 'red', 1],
    ['TiO', 'gamma', 6714.4, 'red', 2],
    ['TiO', 'gamma', 7589.6, 'red', 0],
    ['TiO', 'alpha', 4954.6, 'red', 1],
    ['TiO', 'delta', 8859.6, 'red', 0],
    ['VO', 'B-X', 7333.9, 'red', 3],
    ['C2', 'Swan', 5165.2, 'violet', 1],
    ['CN', 'B-X', 3883.4, 'violet', 0],
  ] as const)(
    'lets the strength of %s %s rise threefold within 1.5 A of %d A',
    (molecule, name, head, side, sub) => {
      const rows = systems.filter((one) => one.molecule === molecule && one.system === name);
      expect(headContrast(generateBandLines([rows[sub]!]), head, side)).toBeGreaterThan(3);
    },
  );

  it('splits the oscillator strength of a system over its lines: gf over lower weight sums to f', () => {
    const system = systems.find((one) => one.molecule === 'CN' && one.system === 'B-X')!;
    const own = generateBandLines([system]);
    // All lines from v = 0, J = 20: over both branches and all upper v the strength is f of the system.
    const energies = own.map((line) => line.energyEv).sort((a, b) => a - b);
    const b0 = system.lower.rotation - 0.5 * system.lower.alpha;
    const level = (b0 * 20 * 21 - ((4 * b0 ** 3) / system.lower.we ** 2) * (20 * 21) ** 2) / 8065.543937;
    const from = own.filter((line) => Math.abs(line.energyEv - level) < 1e-9);
    expect(energies[0]).toBeGreaterThan(0);
    expect(from.length).toBeGreaterThan(1);
    const f = from.reduce((sum, line) => sum + line.gf, 0) / (system.weight * 41);
    expect(f / system.oscillatorStrength).toBeCloseTo(1, 1);
  });
});

describe('molecularPartition', () => {
  // Sauval & Tatum 1984 (ApJS 56, 193), log10 Q at theta = 1 (from memory). 15 per cent: high states and
  // anharmonicity are cut short here.
  it.each([
    ['CH', 3.3586],
    ['CN', 4.0309],
    ['C2', 4.3091],
    ['TiO', 5.3051],
    ['MgH', 3.6704],
    ['CaH', 3.8411],
  ])('of %s at 5040 K agrees with Sauval & Tatum 1984 within 25 per cent', (molecule, logQ) => {
    const found = molecularPartition(BUNDLED_TABLES.molecularStates, molecule, 5040);
    expect(Math.abs(found / 10 ** logQ - 1)).toBeLessThan(0.25);
  });
});
