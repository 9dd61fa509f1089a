/** What a line is seen as: in nebulae, in the broad-line gas of quasars, or in absorption by stars and gas. */
export type LineNature = 'narrow' | 'broad' | 'absorption';

/** A line to measure and to mark. */
export interface RestLine {
  /** Ion and wavelength in the usual notation. */
  readonly name: string;
  readonly wavelengthVacuumAngstrom: number;
  readonly nature: LineNature;
}

const line = (name: string, wavelengthVacuumAngstrom: number, nature: LineNature): RestLine => ({
  name,
  wavelengthVacuumAngstrom,
  nature,
});

/**
 * Vacuum rest wavelengths. Hydrogen: line-strength-weighted centroids of the Dirac levels with the nS Lamb
 * shift (Lyman values equal Morton 2003, ApJS 149, 205, to 1e-4 Å). Forbidden lines: NIST ASD energy levels.
 * Ultraviolet resonance lines: Morton 2003; C IV: Griesmann & Kling 2000 (doublets as f-weighted means).
 * Stellar lines: NIST ASD.
 */
export const REST_LINES: readonly RestLine[] = [
  line('O VI 1034', 1033.82, 'broad'),
  line('Lyα', 1215.67, 'broad'),
  line('N V 1240', 1240.15, 'broad'),
  line('Si IV 1397', 1396.76, 'broad'),
  line('C IV 1549', 1549.06, 'broad'),
  line('He II 1640', 1640.42, 'broad'),
  line('C III] 1909', 1908.734, 'broad'),
  line('C II] 2326', 2325.4, 'broad'),
  line('Mg II 2799', 2798.75, 'broad'),
  line('Hβ broad', 4862.6829, 'broad'),
  line('Hα broad', 6564.6081, 'broad'),
  line('[Ne V] 3427', 3426.8635, 'narrow'),
  line('[O II] 3728', 3728.68, 'narrow'),
  line('[Ne III] 3870', 3869.8612, 'narrow'),
  line('Hδ', 4102.8922, 'narrow'),
  line('Hγ', 4341.6837, 'narrow'),
  line('He II 4687', 4687.0115, 'narrow'),
  line('Hβ', 4862.6829, 'narrow'),
  line('[O III] 4960', 4960.2948, 'narrow'),
  line('[O III] 5008', 5008.2396, 'narrow'),
  line('He I 5877', 5877.2496, 'narrow'),
  line('[O I] 6302', 6302.0462, 'narrow'),
  line('[N II] 6550', 6549.859, 'narrow'),
  line('Hα', 6564.6081, 'narrow'),
  line('[N II] 6585', 6585.2685, 'narrow'),
  line('[S II] 6718', 6718.2945, 'narrow'),
  line('[S II] 6733', 6732.6738, 'narrow'),
  line('[Ar III] 7138', 7137.7572, 'narrow'),
  line('[S III] 9071', 9071.1093, 'narrow'),
  line('[S III] 9533', 9533.2338, 'narrow'),
  line('Fe II 2600', 2600.1729, 'absorption'),
  line('Mg II 2796', 2796.3543, 'absorption'),
  line('Mg II 2803', 2803.5315, 'absorption'),
  line('Ca II K', 3934.7767, 'absorption'),
  line('Ca II H', 3969.5918, 'absorption'),
  line('G band', 4305.6, 'absorption'),
  line('Mg b', 5176.6, 'absorption'),
  line('Na D', 5894.57, 'absorption'),
  line('Ca II 8500', 8500.358, 'absorption'),
  line('Ca II 8544', 8544.4379, 'absorption'),
  line('Ca II 8665', 8664.5204, 'absorption'),
];
