import { SQRT_PI } from './constants.ts';

/**
 * Voigt's function H(a, u), split by size of the arguments:
 * - far from the centre: the Lorentz wing with its first correction;
 * - small damping: the series H0 + a H1 + a^2 H2 (Harris 1948, ApJ 108, 112) with tabulated terms;
 * - else: the rational approximation of Hui, Armstrong & Wray 1978 (JQSRT 19, 509), region p = 6.
 * Within 4e-3 of the exact value relative to it where the pieces meet, elsewhere within 1e-3.
 */

/** Beyond this |u| the wing formula is used. */
export const WING_FROM = 6;
/** The series in a is used below this damping. */
export const SERIES_BELOW = 0.1;
const LARGEST_RATIONAL_DAMPING = 8;

/** Samples per unit of u; linear interpolation then errs by less than 1e-5. */
export const TABLE_PER_UNIT = 200;
const TABLE_LENGTH = WING_FROM * TABLE_PER_UNIT + 2;

/** Dawson's integral F(u) = exp(-u^2) int_0^u exp(t^2) dt by Rybicki's sum (Rybicki 1989, Comp. Phys. 3, 85). */
export function dawson(u: number): number {
  const step = 0.2;
  const nearestEven = 2 * Math.round(u / (2 * step));
  const offset = u - nearestEven * step;
  let sum = 0;
  for (let n = -25; n <= 25; n += 2) {
    sum += Math.exp(-((offset - n * step) ** 2)) / (n + nearestEven);
  }
  return sum / SQRT_PI;
}

/** Harris terms H0, H1, H2 at u = i / TABLE_PER_UNIT. */
export const HARRIS = (() => {
  const h0 = new Float64Array(TABLE_LENGTH);
  const h1 = new Float64Array(TABLE_LENGTH);
  const h2 = new Float64Array(TABLE_LENGTH);
  for (let i = 0; i < TABLE_LENGTH; i += 1) {
    const u = i / TABLE_PER_UNIT;
    h0[i] = Math.exp(-u * u);
    h1[i] = (-2 / SQRT_PI) * (1 - 2 * u * dawson(u));
    h2[i] = (1 - 2 * u * u) * h0[i]!;
  }
  return { h0, h1, h2 };
})();

/** Lorentz wing a / (sqrt(pi) (u^2 + a^2)) with the first term of the asymptotic series. */
function wing(a: number, u: number): number {
  const square = u * u + a * a;
  return (a / (SQRT_PI * square)) * (1 + (1.5 * (u * u - a * a)) / (square * square));
}

const NUMERATOR = [
  122.607931777104326, 214.382388694706425, 181.928533092181549, 93.155580458138441, 30.180142196210589,
  5.912626209773153, 0.564189583562615,
];
const DENOMINATOR = [
  122.60793177387535, 352.730625110963558, 457.334478783897737, 348.703917719495792, 170.354001821091472,
  53.992906912940207, 10.479857114260399, 1,
];

function rational(a: number, u: number): number {
  let topReal = 0;
  let topImaginary = 0;
  for (let i = NUMERATOR.length - 1; i >= 0; i -= 1) {
    const real = topReal * a + topImaginary * u + NUMERATOR[i]!;
    topImaginary = topImaginary * a - topReal * u;
    topReal = real;
  }
  let bottomReal = 0;
  let bottomImaginary = 0;
  for (let i = DENOMINATOR.length - 1; i >= 0; i -= 1) {
    const real = bottomReal * a + bottomImaginary * u + DENOMINATOR[i]!;
    bottomImaginary = bottomImaginary * a - bottomReal * u;
    bottomReal = real;
  }
  const square = bottomReal * bottomReal + bottomImaginary * bottomImaginary;
  return (topReal * bottomReal + topImaginary * bottomImaginary) / square;
}

/**
 * H(a, u) for damping a >= 0 and distance u from the centre in Doppler widths; H(0, 0) = 1, integral over u
 * is sqrt(pi).
 */
export function voigt(a: number, u: number): number {
  const distance = Math.abs(u);
  if (distance >= WING_FROM || a > LARGEST_RATIONAL_DAMPING) {
    return wing(a, distance);
  }
  if (a >= SERIES_BELOW) {
    return rational(a, distance);
  }
  const position = distance * TABLE_PER_UNIT;
  const i = Math.trunc(position);
  const part = position - i;
  const { h0, h1, h2 } = HARRIS;
  const low = h0[i]! + a * (h1[i]! + a * h2[i]!);
  const high = h0[i + 1]! + a * (h1[i + 1]! + a * h2[i + 1]!);
  return low + part * (high - low);
}
