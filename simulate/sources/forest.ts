import type { RandomStream } from '../../pipeline/core/random.ts';
import type { LogGrid } from '../../templates/family.ts';
import { broaden } from '../../templates/prepare/broaden.ts';
import { LIGHT_SPEED_KM_S, wavelengthOf } from '../rest-spectrum.ts';

/** Lyman series: wavelength (Å) and depth relative to Lyman α at the same gas (ratio of f × wavelength, softened). */
const SERIES: readonly (readonly [wavelength: number, relativeDepth: number])[] = [
  [1215.67, 1],
  [1025.72, 0.4],
  [972.54, 0.22],
  [949.74, 0.15],
];
const LYMAN_LIMIT_ANGSTROM = 911.75;

/** Mean depth of the forest, τ = 0.0018 (1+z)^3.92: Faucher-Giguère et al. 2008 (ApJ 681, 831), eq 21. */
const MEAN_DEPTH = 0.0018;
const MEAN_DEPTH_GROWTH = 3.92;

/** Clumps: correlation length along the sight line, and scatter of ln τ at it (by eye). */
const CLUMP_KM_S = 150;
const CLUMP_SCATTER = 1.3;
/** Beyond the Lyman limit a sight line meets a thick absorber sooner or later: light lost per unit redshift. */
const LIMIT_DEPTH_PER_REDSHIFT = 1.2;

/**
 * Light let through by the hydrogen along one sight line: a clumpy field whose mean depth follows the
 * measured one, so that no two quasars share a forest and none has the smooth mean.
 *
 * @param grid rest frame of the quasar
 * @returns one value in 0..1 per pixel; 1 redward of Lyman α
 */
export function forestTransmission(random: RandomStream, grid: LogGrid, redshift: number): Float32Array {
  const sigma = CLUMP_KM_S / LIGHT_SPEED_KM_S / grid.step;
  const white = Float32Array.from({ length: grid.length }, () => random.normal());
  // Smoothing white noise with a Gaussian divides its scatter by sqrt(2 √π σ).
  const restore = Math.sqrt(2 * Math.sqrt(Math.PI) * sigma);
  const clumps = broaden(white, sigma).map((value) => value * restore);
  const through = new Float32Array(grid.length);
  for (let i = 0; i < grid.length; i++) {
    const wavelength = wavelengthOf(grid, i);
    const absorberOf = (line: number): number => (wavelength / line) * (1 + redshift) - 1;
    // exp(σ g − σ²/2) has mean 1.
    const clump = Math.exp(CLUMP_SCATTER * clumps[i]! - 0.5 * CLUMP_SCATTER ** 2);
    let depth = 0;
    for (const [line, relative] of SERIES) {
      const absorber = absorberOf(line);
      if (wavelength < line && absorber > 0) {
        depth += relative * MEAN_DEPTH * (1 + absorber) ** MEAN_DEPTH_GROWTH * clump;
      }
    }
    if (wavelength < LYMAN_LIMIT_ANGSTROM) {
      depth += LIMIT_DEPTH_PER_REDSHIFT * (redshift - Math.max(0, absorberOf(LYMAN_LIMIT_ANGSTROM)));
    }
    through[i] = Math.exp(-depth);
  }
  return through;
}
