/** How a line of the composite varies from quasar to quasar. */
export type LineFamily =
  | 'oxygen6'
  | 'lyman-alpha'
  | 'nitrogen5'
  | 'silicon2'
  | 'oxygen1'
  | 'silicon4'
  | 'carbon4'
  | 'helium2'
  | 'oxygen3-semi'
  | 'nitrogen3'
  | 'aluminium3'
  | 'carbon3'
  | 'carbon2'
  | 'neon4'
  | 'magnesium2'
  | 'neon5'
  | 'narrow'
  | 'balmer'
  | 'helium2-optical'
  | 'helium1'
  | 'oxygen1-red';

/** One line of the mean quasar spectrum. Rest frame, vacuum ångström. */
export interface CompositeLine {
  /** Where the composite has it: high ions are shifted blueward of the laboratory wavelength. */
  readonly centre: number;
  readonly equivalentWidth: number;
  readonly sigma: number;
  readonly family: LineFamily;
  /** A second, much wider component of the same line, with its own scatter. */
  readonly base: boolean;
}

const line = (
  centre: number,
  equivalentWidth: number,
  sigma: number,
  family: LineFamily,
  base = false,
): CompositeLine => ({ centre, equivalentWidth, sigma, family, base });

/**
 * Emission lines of the mean quasar after Vanden Berk et al. 2001 (AJ 122, 549), table 2, from memory. Blends
 * (N V with Lyα, He II with O III], Al III with C III], wide bases of C IV, Mg II and the Balmer lines) are
 * shared out by hand.
 */
export const COMPOSITE_LINES: readonly CompositeLine[] = [
  line(1033.03, 9.77, 7.76, 'oxygen6'),
  line(1065.1, 0.8, 4.2, 'oxygen6'),
  line(1117.26, 3.66, 8.49, 'oxygen6'),
  line(1175.35, 0.83, 4, 'oxygen6'),
  line(1216.25, 92.91, 19.46, 'lyman-alpha'),
  line(1239.85, 18, 14, 'nitrogen5'),
  line(1262.6, 0.21, 2.75, 'silicon2'),
  line(1305.42, 1.66, 5.42, 'oxygen1'),
  line(1336.6, 0.69, 3.86, 'silicon2'),
  line(1396.76, 8.13, 14.14, 'silicon4'),
  line(1546.15, 23.78, 14.33, 'carbon4'),
  line(1541, 6, 28, 'carbon4', true),
  line(1637.84, 2.5, 12, 'helium2'),
  line(1637, 3, 30, 'helium2'),
  line(1664.74, 2.5, 10, 'oxygen3-semi'),
  line(1746.84, 0.44, 4.95, 'nitrogen3'),
  line(1856.76, 1.5, 9, 'aluminium3'),
  line(1892, 3, 9, 'carbon3'),
  line(1906, 18, 22, 'carbon3'),
  line(2324.73, 2.02, 22, 'carbon2'),
  line(2423.5, 0.44, 8.2, 'neon4'),
  line(2800.26, 22, 22, 'magnesium2'),
  line(2800.26, 10, 52, 'magnesium2', true),
  line(3345.39, 0.35, 5.5, 'neon5'),
  line(3426.84, 1.22, 9.1, 'neon5'),
  line(3729.66, 1.56, 3.32, 'narrow'),
  line(3869.77, 1.38, 5.3, 'narrow'),
  line(3889, 1, 16, 'balmer'),
  line(3968.43, 0.45, 5.5, 'narrow'),
  line(3971, 1.5, 17, 'balmer'),
  line(4102.73, 5.05, 18.62, 'balmer'),
  line(4346.4, 12.62, 20.32, 'balmer'),
  line(4364, 0.7, 4.5, 'narrow'),
  line(4685, 1.5, 25, 'helium2-optical'),
  line(4862, 30, 30, 'balmer'),
  line(4862, 16, 65, 'balmer', true),
  line(4960.36, 3.5, 3.85, 'narrow'),
  line(5008.22, 13.23, 6.04, 'narrow'),
  line(5877.3, 4.94, 23.45, 'helium1'),
  line(6549.9, 0.7, 3.5, 'narrow'),
  line(6564.9, 130, 34, 'balmer'),
  line(6565, 65, 80, 'balmer', true),
  line(6585.6, 2, 3.5, 'narrow'),
  line(6718.9, 1.65, 3.3, 'narrow'),
  line(6733.7, 1.5, 3.3, 'narrow'),
  line(8457, 10, 30, 'oxygen1-red'),
];
