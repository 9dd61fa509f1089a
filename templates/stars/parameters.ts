/** Groups of the star grid. */
export type StarGroup = 'dwarf' | 'giant' | 'horizontal-branch' | 'supergiant' | 'white-dwarf' | 'carbon';

/** What a star is made from. */
export interface StarParameters {
  /** Unique within the grid, e.g. `dwarf 5777 4.5 +0.0`: group, temperature, gravity, metallicity. */
  readonly name: string;
  readonly group: StarGroup;
  /** Effective temperature, kelvin. */
  readonly effectiveTemperature: number;
  /** log10 of the surface gravity in cm s^-2. */
  readonly logGravity: number;
  /** Metals relative to the Sun, dex. */
  readonly metallicity: number;
  /** Alpha elements beyond that, dex. */
  readonly alpha: number;
  /** Carbon beyond that, dex. */
  readonly carbon: number;
}

function star(
  group: StarGroup,
  effectiveTemperature: number,
  logGravity: number,
  metallicity = 0,
  alpha = 0,
  carbon = 0,
): StarParameters {
  const sign = metallicity < 0 ? '-' : '+';
  const name = [
    group,
    effectiveTemperature,
    logGravity.toFixed(1),
    `${sign}${Math.abs(metallicity).toFixed(1)}`,
  ].join(' ');
  return { name, group, effectiveTemperature, logGravity, metallicity, alpha, carbon };
}

const DWARF_TEMPERATURES = [
  3200, 3500, 3800, 4100, 4500, 5000, 5500, 5777, 6000, 6500, 7000, 7500, 8000, 8500, 9000, 9500, 10500,
  12000, 15000, 20000, 30000, 40000,
];

/** Gravity of the main sequence, log10 cm s^-2. */
function dwarfGravity(temperature: number): number {
  if (temperature < 4000) {
    return 4.8;
  }
  return temperature < 6500 ? 4.5 : 4.2;
}

/** Metallicities of the dwarfs, with the alpha enhancement of stars of that age, and where each is of use. */
const DWARF_METALS: readonly {
  readonly metallicity: number;
  readonly alpha: number;
  readonly from: number;
  readonly to: number;
}[] = [
  { metallicity: 0, alpha: 0, from: 3200, to: 40000 },
  { metallicity: -1, alpha: 0.3, from: 3500, to: 9000 },
  { metallicity: -2, alpha: 0.4, from: 4500, to: 7000 },
  { metallicity: 0.3, alpha: 0, from: 3500, to: 6500 },
  { metallicity: -0.5, alpha: 0.1, from: 4500, to: 7000 },
];

const GIANT_BRANCH: readonly (readonly [number, number])[] = [
  [3300, 0.5],
  [3600, 1.0],
  [4000, 1.6],
  [4400, 2.0],
  [4800, 2.6],
  [5200, 3.2],
  [5600, 3.6],
  [6000, 3.8],
];
const GIANT_METALS: readonly (readonly [number, number])[] = [
  [0, 0],
  [0.3, 0],
  [-0.5, 0.15],
  [-1, 0.3],
  [-2, 0.4],
];
/** No giant this cool is that poor in metals. */
const POOREST_COOL_GIANT = { below: 4000, metallicity: -2 };

const HORIZONTAL_BRANCH: readonly (readonly [number, number])[] = [
  [7500, 3.2],
  [8500, 3.2],
  [9500, 3.4],
  [11000, 3.6],
];
const SUPERGIANTS: readonly (readonly [number, number])[] = [
  [7500, 1.8],
  [9000, 2.0],
  [12000, 2.3],
  [18000, 2.8],
];
const WHITE_DWARF_TEMPERATURES = [7000, 8500, 10000, 12500, 15000, 20000, 30000, 45000];
/** Metals sink out of sight in white dwarfs. */
const WHITE_DWARF_METALLICITY = -4;
const CARBON_STARS: readonly (readonly [number, number, number])[] = [
  [3500, 1.0, 0.4],
  [4200, 2.0, 0.6],
  [5000, 4.5, 0.7],
];

/** The grid: 116 stars from M dwarfs to O stars, giants, horizontal branch, supergiants, white dwarfs, carbon stars. */
export const STAR_GRID: readonly StarParameters[] = [
  ...DWARF_TEMPERATURES.flatMap((t) =>
    DWARF_METALS.filter(({ from, to }) => t >= from && t <= to).map(({ metallicity, alpha }) =>
      star('dwarf', t, dwarfGravity(t), metallicity, alpha),
    ),
  ),
  ...GIANT_BRANCH.flatMap(([t, gravity]) =>
    GIANT_METALS.filter(
      ([metallicity]) => t >= POOREST_COOL_GIANT.below || metallicity > POOREST_COOL_GIANT.metallicity,
    ).map(([metallicity, alpha]) => star('giant', t, gravity, metallicity, alpha)),
  ),
  ...HORIZONTAL_BRANCH.map(([t, gravity]) => star('horizontal-branch', t, gravity, -1.5, 0.3)),
  ...SUPERGIANTS.map(([t, gravity]) => star('supergiant', t, gravity)),
  ...WHITE_DWARF_TEMPERATURES.map((t) => star('white-dwarf', t, 8, WHITE_DWARF_METALLICITY)),
  ...CARBON_STARS.map(([t, gravity, carbon]) => star('carbon', t, gravity, -0.4, 0, carbon)),
];

/**
 * A star of the grid by its name.
 * @throws RangeError when there is none.
 */
export function starNamed(name: string): StarParameters {
  const found = STAR_GRID.find((candidate) => candidate.name === name);
  if (!found) {
    throw new RangeError(`star must be one of the ${STAR_GRID.length} of the grid, got ${name}`);
  }
  return found;
}
