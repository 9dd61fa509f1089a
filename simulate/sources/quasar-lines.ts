/** How a feature's strength and shape go together with others of the same origin. */
export type QuasarLineOrigin = 'high-ionisation' | 'low-ionisation' | 'balmer' | 'narrow';

/** An emission feature of a quasar: rest wavelength (vacuum Å), equivalent width (Å) and sigma (km/s) at the mean. */
export interface QuasarLine {
  readonly wavelength: number;
  readonly equivalentWidth: number;
  readonly sigmaKmS: number;
  readonly origin: QuasarLineOrigin;
}

const line = (
  wavelength: number,
  equivalentWidth: number,
  sigmaKmS: number,
  origin: QuasarLineOrigin,
): QuasarLine => ({ wavelength, equivalentWidth, sigmaKmS, origin });

/**
 * Mean strengths and widths after the composite of Vanden Berk et al. 2001 (AJ 122, 549), table 2, rounded,
 * from memory; rest wavelengths are the laboratory ones.
 */
export const QUASAR_LINES: readonly QuasarLine[] = [
  line(1033.8, 9, 2300, 'high-ionisation'),
  line(1215.67, 80, 3200, 'high-ionisation'),
  line(1240.14, 18, 3100, 'high-ionisation'),
  line(1304.4, 1.7, 1300, 'low-ionisation'),
  line(1335.3, 0.7, 900, 'low-ionisation'),
  line(1397.8, 8, 3000, 'high-ionisation'),
  line(1549.06, 25, 2900, 'high-ionisation'),
  line(1640.42, 4, 3500, 'high-ionisation'),
  line(1664.7, 2, 2200, 'high-ionisation'),
  line(1857.8, 1.5, 1700, 'low-ionisation'),
  line(1892.03, 3, 1600, 'low-ionisation'),
  line(1908.73, 17, 3100, 'low-ionisation'),
  line(2325.4, 2, 2700, 'low-ionisation'),
  line(2798.75, 30, 2500, 'low-ionisation'),
  line(4102.89, 5, 1500, 'balmer'),
  line(4341.68, 12, 1700, 'balmer'),
  line(4862.68, 42, 2300, 'balmer'),
  line(5877.25, 5, 1600, 'balmer'),
  line(6564.61, 180, 2000, 'balmer'),
  line(3426.86, 1.2, 350, 'narrow'),
  line(3728.5, 1.6, 280, 'narrow'),
  line(3869.86, 1.4, 300, 'narrow'),
  line(4960.29, 4.4, 250, 'narrow'),
  line(5008.24, 13.2, 250, 'narrow'),
  line(6585.27, 2, 220, 'narrow'),
  line(6718.29, 1.6, 220, 'narrow'),
  line(6732.67, 1.5, 220, 'narrow'),
];

/**
 * Multiplets of singly ionised iron: centre (Å), width of the multiplet (Å, sigma), strength relative to the
 * others. Centres after the multiplet table of Moore 1945 (UV multiplets 191, 61–64, 1–3; optical 37, 38, 42,
 * 48, 49), widths and strengths chosen by hand to look like composites: no family is made this way.
 */
export const IRON_MULTIPLETS: readonly (readonly [centre: number, sigma: number, strength: number])[] = [
  [1787, 8, 0.06],
  [2080, 45, 0.2],
  [2250, 40, 0.3],
  [2390, 35, 0.75],
  [2490, 35, 0.8],
  [2600, 30, 0.65],
  [2740, 25, 0.5],
  [2880, 40, 0.22],
  [2965, 25, 0.2],
  [3185, 40, 0.12],
  [4500, 35, 0.11],
  [4570, 35, 0.13],
  [4630, 30, 0.11],
  [4925, 14, 0.05],
  [5018, 14, 0.06],
  [5190, 35, 0.12],
  [5290, 40, 0.14],
];
