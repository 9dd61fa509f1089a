import type { LogGrid } from '../family.ts';
import { KELVIN_PER_EV, LIGHT_SPEED, LINE_CROSS_SECTION, SECOND_RADIATION, SQRT_PI } from './constants.ts';
import type { Gas } from './gas.ts';
import type { Absorbers } from './line-absorbers.ts';
import type { LineList } from './line-list.ts';
import { localContinuum } from './opacity-rows.ts';
import type { OpacityRows } from './opacity-rows.ts';
import { HARRIS, SERIES_BELOW, TABLE_PER_UNIT, voigt, WING_FROM } from './voigt.ts';

/** A line is followed until it falls below this share of the continuum: 0.2 per cent is not seen. */
const CUT_OFF = 2e-3;
/** No line is followed farther, km/s over the speed of light. */
const GREATEST_REACH = 9000 / 2.99792458e5;
/** Van der Waals widths grow with this power of temperature from 10,000 K. */
const VAN_DER_WAALS_EXPONENT = 0.3;

/** Adds strength * H(a, u) on pixels first..last of a row whose pixel i lies at u = (i - centre) * perPixel. */
function addProfile(
  row: Float32Array,
  first: number,
  last: number,
  centre: number,
  perPixel: number,
  a: number,
  strength: number,
): void {
  if (a >= SERIES_BELOW) {
    for (let i = first; i <= last; i += 1) {
      row[i]! += strength * voigt(a, (i - centre) * perPixel);
    }
    return;
  }
  const { h0, h1, h2 } = HARRIS;
  const coreFirst = Math.max(first, Math.ceil(centre - WING_FROM / perPixel));
  const coreLast = Math.min(last, Math.floor(centre + WING_FROM / perPixel));
  const scale = perPixel * TABLE_PER_UNIT;
  for (let i = coreFirst; i <= coreLast; i += 1) {
    const position = Math.abs(i - centre) * scale;
    const k = position | 0;
    const part = position - k;
    const low = h0[k]! + a * (h1[k]! + a * h2[k]!);
    const high = h0[k + 1]! + a * (h1[k + 1]! + a * h2[k + 1]!);
    row[i]! += strength * (low + part * (high - low));
  }
  const wing = (strength * a) / SQRT_PI;
  for (let i = first; i < coreFirst; i += 1) {
    const u2 = ((i - centre) * perPixel) ** 2;
    row[i]! += (wing / u2) * (1 + 1.5 / u2);
  }
  for (let i = Math.max(coreLast + 1, first); i <= last; i += 1) {
    const u2 = ((i - centre) * perPixel) ** 2;
    row[i]! += (wing / u2) * (1 + 1.5 / u2);
  }
}

/**
 * Adds the lines of a list to the opacity of every depth:
 * kappa = (pi e^2 / m c) gf (N/U) exp(-E/kT) (1 - exp(-h nu/kT)) lambda / (sqrt(pi) b) H(a, u).
 * Lines fainter than CUT_OFF of the continuum at a depth are left out there: of 300,000 molecular lines few
 * pass in most stars.
 * @param absorbers one per species of the list.
 */
export function addLines(
  lines: LineList,
  absorbers: readonly Absorbers[],
  gas: Gas,
  grid: LogGrid,
  rows: OpacityRows,
): void {
  const { length } = gas;
  const minusInverseEv = gas.temperature.map((t) => -KELVIN_PER_EV / t);
  const minusInverseCm = gas.temperature.map((t) => -SECOND_RADIATION / t);
  const vanDerWaalsDensity = gas.neutralHydrogen.map(
    (density, depth) => density * (gas.temperature[depth]! / 1e4) ** VAN_DER_WAALS_EXPONENT,
  );
  /** Everything of the strength that the lines of a species share. */
  const shared = absorbers.map(({ perWeight, doppler }) =>
    perWeight.map((density, depth) => (LINE_CROSS_SECTION * density) / (SQRT_PI * doppler[depth]!)),
  );
  const reachPixels = Math.floor(GREATEST_REACH / grid.step);
  for (let line = 0; line < lines.length; line += 1) {
    const wavelength = lines.wavelength[line]!;
    const centre = (Math.log(wavelength) - grid.lnStart) / grid.step;
    const nearest = Math.round(centre);
    if (nearest < -reachPixels || nearest >= grid.length + reachPixels) {
      continue;
    }
    const centimetre = wavelength * 1e-8;
    const energyEv = lines.energyEv[line]!;
    const gfLambda = lines.gf[line]! * centimetre;
    const species = lines.speciesIndex[line]!;
    const strengths = shared[species]!;
    const { doppler } = absorbers[species]!;
    for (let depth = 0; depth < length; depth += 1) {
      const bound = gfLambda * strengths[depth]!;
      const continuum = localContinuum(rows, depth, nearest);
      const threshold = CUT_OFF * continuum;
      if (bound < threshold) {
        continue;
      }
      const unstimulated = bound * Math.exp(energyEv * minusInverseEv[depth]!);
      if (unstimulated < threshold) {
        continue;
      }
      const strength = unstimulated * (1 - Math.exp(minusInverseCm[depth]! / centimetre));
      const ratio = strength / threshold;
      if (ratio < 1) {
        continue;
      }
      const width =
        lines.radiative[line]! +
        lines.vanDerWaals[line]! * vanDerWaalsDensity[depth]! +
        lines.stark[line]! * gas.electrons[depth]!;
      const b = doppler[depth]!;
      const a = (width * centimetre) / (4 * Math.PI * b);
      const reach = Math.max(Math.sqrt(Math.log(ratio)), Math.sqrt((a * ratio) / SQRT_PI));
      const perPixel = (grid.step * LIGHT_SPEED) / b;
      const half = Math.min(Math.trunc(reach / perPixel) + 1, reachPixels);
      const first = Math.max(nearest - half, 0);
      const last = Math.min(nearest + half, grid.length - 1);
      addProfile(rows.depths[depth]!, first, last, centre, perPixel, a, strength);
    }
  }
}
