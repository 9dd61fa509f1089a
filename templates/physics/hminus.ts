/**
 * Absorption by the negative hydrogen ion, John 1988, A&A 193, 189. Coefficients per neutral hydrogen atom
 * and per unit electron pressure: cm^4 dyn^-1. Agree with Bell & Berrington 1987 within 1.5 per cent.
 */

/** Detachment threshold, micrometre. */
const THRESHOLD_UM = 1.6419;
/** hc/k in micrometre kelvin, as rounded in the paper. */
const ALPHA = 1.439e4;
/** Bound-free series, John 1988 table 2 and eq. 5. */
const BOUND_FREE = [152.519, 49.534, -118.858, 92.536, -34.194, 4.982];
/** The free-free series changes here, micrometre; and no series is given below the second value. */
const FREE_FREE_BREAK_UM = 0.3645;
const FREE_FREE_LIMIT_UM = 0.1823;

/** Free-free series, John 1988 table 3: rows n = 2..6 (n = 1 is zero), columns A..F. */
const FREE_FREE_LONG = [
  [2483.346, 285.827, -2054.291, 2827.776, -1341.537, 208.952],
  [-3449.889, -1158.382, 8746.523, -11485.632, 5303.609, -812.939],
  [2200.04, 2427.719, -13651.105, 16755.524, -7510.494, 1132.738],
  [-696.271, -1841.4, 8624.97, -10051.53, 4400.067, -655.02],
  [88.283, 444.517, -1863.864, 2095.288, -901.788, 132.985],
];
/** Same for the short wavelengths: rows n = 1..4. */
const FREE_FREE_SHORT = [
  [518.1021, -734.8666, 1021.1775, -479.0721, 93.1373, -6.4285],
  [473.2636, 1443.4137, -1977.3395, 922.3575, -178.9275, 12.36],
  [-482.2089, -737.1616, 1096.8827, -521.1341, 101.7963, -7.0571],
  [115.5291, 169.6374, -245.649, 114.243, -21.9972, 1.5097],
];

/** Bound-free cross-section per H- ion, cm^2, at a vacuum wavelength in angstrom; 0 beyond the threshold. */
export function hminusCrossSection(wavelengthAngstrom: number): number {
  const um = wavelengthAngstrom * 1e-4;
  if (um >= THRESHOLD_UM) {
    return 0;
  }
  const root = Math.sqrt(1 / um - 1 / THRESHOLD_UM);
  let series = 0;
  for (let term = BOUND_FREE.length - 1; term >= 0; term -= 1) {
    series = series * root + BOUND_FREE[term]!;
  }
  return 1e-18 * um ** 3 * root ** 3 * series;
}

/** Bound-free coefficient with stimulated emission, cm^4 dyn^-1, at an angstrom wavelength and a kelvin temperature. */
export function hminusBoundFree(wavelengthAngstrom: number, temperature: number): number {
  const stimulated = 1 - Math.exp(-ALPHA / (wavelengthAngstrom * 1e-4 * temperature));
  return (
    0.75 *
    temperature ** -2.5 *
    Math.exp(ALPHA / (THRESHOLD_UM * temperature)) *
    stimulated *
    hminusCrossSection(wavelengthAngstrom)
  );
}

/**
 * Coefficients of the free-free series at one wavelength: the coefficient at theta = 5040 K / T is
 * sum_k c_k theta^(1 + k/2), k = 0..5, in cm^4 dyn^-1. Split off because it is shared by all temperatures.
 */
export function hminusFreeFreeSeries(wavelengthAngstrom: number): number[] {
  const um = Math.max(wavelengthAngstrom * 1e-4, FREE_FREE_LIMIT_UM);
  const isLong = um > FREE_FREE_BREAK_UM;
  const rows = isLong ? FREE_FREE_LONG : FREE_FREE_SHORT;
  const series = rows.map(
    ([a, b, c, d, e, f]) => 1e-29 * (um * um * a! + b! + (c! + (d! + (e! + f! / um) / um) / um) / um),
  );
  return isLong ? [0, ...series] : series;
}

/** Free-free coefficient, cm^4 dyn^-1, from the series of one wavelength at a kelvin temperature. */
export function hminusFreeFree(series: readonly number[], temperature: number): number {
  const theta = 5040 / temperature;
  const root = Math.sqrt(theta);
  let sum = 0;
  for (let k = series.length - 1; k >= 0; k -= 1) {
    sum = sum * root + series[k]!;
  }
  return theta * sum;
}
