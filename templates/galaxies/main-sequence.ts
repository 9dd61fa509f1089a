/** A star on the main sequence: kelvin and solar radii. */
export interface SequenceStar {
  readonly temperature: number;
  readonly radius: number;
}

/**
 * Mean main sequence: mass (Sun = 1), effective temperature (K), radius (Sun = 1). After the compilations of
 * dwarfs with measured radii that Pecaut & Mamajek 2013 (ApJS 208, 9) gather; values from memory.
 */
const SEQUENCE: readonly (readonly [mass: number, temperature: number, radius: number])[] = [
  [0.15, 3100, 0.18],
  [0.2, 3200, 0.22],
  [0.3, 3400, 0.31],
  [0.4, 3550, 0.4],
  [0.5, 3750, 0.49],
  [0.6, 4050, 0.6],
  [0.7, 4500, 0.69],
  [0.8, 5000, 0.77],
  [0.9, 5400, 0.87],
  [1, 5770, 1],
  [1.1, 5980, 1.12],
  [1.2, 6200, 1.25],
  [1.3, 6420, 1.36],
  [1.4, 6650, 1.47],
  [1.6, 7200, 1.62],
  [1.8, 7900, 1.72],
  [2, 8700, 1.8],
  [2.5, 10200, 2.1],
  [3, 11800, 2.4],
  [4, 14500, 2.9],
  [5, 16800, 3.4],
  [7, 20500, 4.2],
  [10, 25000, 5.2],
  [15, 31000, 6.6],
  [20, 35000, 7.8],
  [30, 39500, 9.8],
];

/** The least massive star of the table, solar masses. */
export const LEAST_MASS = SEQUENCE[0]![0];

/**
 * A star of the main sequence, interpolated in the logarithms.
 *
 * @param mass 0.15 to 30 solar masses; the nearest end is used beyond
 */
export function sequenceStar(mass: number): SequenceStar {
  const last = SEQUENCE.length - 1;
  const clamped = Math.min(SEQUENCE[last]![0], Math.max(LEAST_MASS, mass));
  let upper = 1;
  while (upper < last && SEQUENCE[upper]![0] < clamped) upper++;
  const [m0, t0, r0] = SEQUENCE[upper - 1]!;
  const [m1, t1, r1] = SEQUENCE[upper]!;
  const part = Math.log(clamped / m0) / Math.log(m1 / m0);
  return { temperature: t0 * (t1 / t0) ** part, radius: r0 * (r1 / r0) ** part };
}

/**
 * The same star in a population whose most massive star still on the sequence has `turnOff` solar masses:
 * stars near the turn-off have grown to 1.5 times their radius and cooled by 3 per cent (a straight line that
 * stands for evolutionary tracks; chosen by hand).
 */
export function agedStar(mass: number, turnOff: number): SequenceStar {
  const star = sequenceStar(mass);
  const ratio = mass / turnOff;
  return {
    temperature: star.temperature * (1 - 0.3 * Math.max(0, ratio - 0.9)),
    radius: star.radius * (1 + 2 * Math.max(0, ratio - 0.75)),
  };
}
