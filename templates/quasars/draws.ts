import { type RandomStream, seededRandom } from '../../pipeline/core/random.ts';
import { quasarReddening } from '../dust/quasar.ts';
import { dustTransmission } from '../dust/transmission.ts';
import type { LogGrid } from '../family.ts';
import { LIGHT_SPEED_KM_S } from '../physics/constants.ts';
import { broaden } from '../prepare/broaden.ts';
import { meanOver, pixelAt, wavelengthsOf } from '../prepare/log-grid.ts';
import { balmerContinuum } from './balmer-continuum.ts';
import { COMPOSITE_LINES, type CompositeLine, type LineFamily } from './composite-lines.ts';

/** Scatter of the equivalent widths, standard deviation of the natural logarithm, by line (from memory). */
const SCATTER: Partial<Record<LineFamily, number>> = {
  'lyman-alpha': 0.35,
  nitrogen5: 0.5,
  silicon4: 0.3,
  carbon4: 0.35,
  carbon3: 0.25,
  magnesium2: 0.3,
  balmer: 0.3,
  narrow: 0.9,
  helium2: 0.5,
  aluminium3: 0.4,
  oxygen1: 0.4,
  oxygen6: 0.3,
  helium1: 0.4,
  neon5: 0.6,
  silicon2: 0.5,
  'oxygen1-red': 0.4,
};
/** Scatter all lines of one quasar share. */
const COMMON_SCATTER = 0.22;
const WIDTH_SCATTER = 0.33;
const BASE_SCATTER = 0.5;
/** High ions are blueshifted by 200 ± 500 km/s, C III] by two fifths of that (Richards et al. 2002). */
const SHIFT_KM_S = { mean: 200, scatter: 500 };
const HIGH_IONS: ReadonlySet<LineFamily> = new Set(['carbon4', 'silicon4', 'helium2', 'nitrogen5']);
/** Continuum slopes below and above 4800 Å: Vanden Berk et al. 2001, with scatter. */
const BLUE_SLOPE = { mean: -1.56, scatter: 0.35 };
const RED_SLOPE = { mean: -0.3, scatter: 0.4 };
const SLOPE_BREAK = 4800;
/** Iron at 2480–2600 Å and the Balmer bump at 3600 Å as fractions of the continuum; optical iron × 3. */
const IRON_LEVEL = 0.22;
const BUMP_LEVEL = 0.1;
const OPTICAL_IRON = 3;
const OPTICAL_FROM = 3600;
/** Share of quasars with broad absorption troughs, and those troughs: ångström and depth. */
const TROUGH_SHARE = 0.08;
const TROUGHS: readonly (readonly [wavelength: number, depth: number])[] = [
  [1549.06, 0.8],
  [1240.1, 0.7],
  [1397, 0.5],
  [1215.67, 0.3],
];

/**
 * Quasars drawn at random around the mean spectrum: slope, line strengths and widths, blueshifts, iron,
 * Balmer bump, dust, broad absorption. No intergalactic absorption yet. Deterministic for a seed.
 *
 * @param iron the blend of `ironBlend` on the same grid
 * @param count how many, ≥ 1
 */
export function drawQuasars(grid: LogGrid, iron: Float32Array, count: number, seed: number): Float32Array[] {
  const random = seededRandom(seed);
  const frame = {
    grid,
    wavelengths: wavelengthsOf(grid),
    iron,
    bump: balmerContinuum(grid),
  };
  return Array.from({ length: count }, () => drawOne(frame, random));
}

interface Frame {
  readonly grid: LogGrid;
  readonly wavelengths: Float64Array;
  readonly iron: Float32Array;
  readonly bump: Float32Array;
}

function drawOne({ grid, wavelengths, iron, bump }: Frame, random: RandomStream): Float32Array {
  const logNormal = (scatter: number, offset = 0): number => Math.exp(offset + scatter * random.normal());
  const blue = BLUE_SLOPE.mean + BLUE_SLOPE.scatter * random.normal();
  const red = RED_SLOPE.mean + RED_SLOPE.scatter * random.normal();
  const continuum = (wavelength: number): number =>
    (wavelength / SLOPE_BREAK) ** (wavelength < SLOPE_BREAK ? blue : red);
  const common = COMMON_SCATTER * random.normal();
  const strengths = new Map<LineFamily, number>();
  for (const { family } of COMPOSITE_LINES) {
    if (!strengths.has(family)) strengths.set(family, logNormal(SCATTER[family] ?? 0, common));
  }
  const width = logNormal(WIDTH_SCATTER);
  const base = logNormal(BASE_SCATTER);
  const blueshift = SHIFT_KM_S.mean + SHIFT_KM_S.scatter * random.normal();

  const flux = Float64Array.from(wavelengths, continuum);
  for (const line of COMPOSITE_LINES) {
    const shift = HIGH_IONS.has(line.family) ? blueshift : line.family === 'carbon3' ? 0.4 * blueshift : 0;
    const centre = line.centre * (1 - shift / LIGHT_SPEED_KM_S);
    const strength = strengths.get(line.family)! * (line.base ? base : 1);
    addLine(grid, wavelengths, flux, line, centre, strength * continuum(centre), width);
  }
  addIron(grid, wavelengths, flux, iron, continuum, {
    width,
    level: logNormal(0.5),
    optical: OPTICAL_IRON * logNormal(0.4),
  });
  const bumpLevel = BUMP_LEVEL * continuum(3600) * logNormal(0.5);
  // Most quasars are hardly reddened; an exponential tail of E(B−V) with mean 0.03 mag.
  const reddening = Math.max(0, -0.03 * Math.log(1 - random.uniform()) - 0.01);
  for (let i = 0; i < flux.length; i++) {
    flux[i] =
      (flux[i]! + bumpLevel * bump[i]!) * dustTransmission(reddening * quasarReddening(wavelengths[i]!));
  }
  if (random.uniform() < TROUGH_SHARE) {
    absorb(wavelengths, flux, 3000 + 12_000 * random.uniform(), 1500 + 3500 * random.uniform());
  }
  return Float32Array.from(flux);
}

/** Adds a line: a Gaussian when narrow, a sharp and a wide Gaussian (62 and 38 per cent) when broad. */
function addLine(
  grid: LogGrid,
  wavelengths: Float64Array,
  flux: Float64Array,
  line: CompositeLine,
  centre: number,
  continuum: number,
  width: number,
): void {
  const isNarrow = line.family === 'narrow';
  const sigma = line.sigma * (isNarrow || line.family === 'neon5' ? 1 : width);
  const parts: readonly (readonly [share: number, sigma: number])[] = isNarrow
    ? [[1, sigma]]
    : [
        [0.62, 0.75 * sigma],
        [0.38, 1.7 * sigma],
      ];
  const reach = 7 * sigma;
  const from = Math.max(0, Math.floor(pixelAt(grid, Math.max(1, centre - reach))));
  const to = Math.min(grid.length, Math.ceil(pixelAt(grid, centre + reach)));
  for (let i = from; i < to; i++) {
    for (const [share, s] of parts) {
      const profile = Math.exp(-0.5 * ((wavelengths[i]! - centre) / s) ** 2) / (s * Math.sqrt(2 * Math.PI));
      flux[i]! += share * line.equivalentWidth * continuum * profile;
    }
  }
}

function addIron(
  grid: LogGrid,
  wavelengths: Float64Array,
  flux: Float64Array,
  iron: Float32Array,
  continuum: (wavelength: number) => number,
  scale: { readonly width: number; readonly level: number; readonly optical: number },
): void {
  const sigma = Math.max(700, 1600 * scale.width) / LIGHT_SPEED_KM_S / grid.step;
  const blend = broaden(iron, sigma);
  const level = (scale.level * IRON_LEVEL * continuum(2540)) / meanOver(grid, blend, 2480, 2600);
  for (let i = 0; i < flux.length; i++) {
    flux[i]! += level * blend[i]! * (wavelengths[i]! < OPTICAL_FROM ? 1 : scale.optical);
  }
}

/** Broad absorption troughs, blueshifted by a velocity and of a width, km/s. */
function absorb(wavelengths: Float64Array, flux: Float64Array, velocity: number, width: number): void {
  for (let i = 0; i < flux.length; i++) {
    for (const [wavelength, depth] of TROUGHS) {
      const off = (wavelengths[i]! / wavelength - 1) * LIGHT_SPEED_KM_S + velocity;
      flux[i]! *= 1 - depth * Math.exp(-0.5 * (off / width) ** 2);
    }
  }
}
