import { starburstAttenuation } from '../dust/starburst.ts';
import { dustTransmission } from '../dust/transmission.ts';
import { LIGHT_SPEED_KM_S } from '../physics/constants.ts';
import { REST_WAVELENGTHS as REST } from './rest-wavelengths.ts';

/** One line of a group: rest wavelength (vacuum Å) and flux (energy) relative to the others. */
export interface GroupLine {
  readonly wavelength: number;
  readonly flux: number;
}

/** Lines whose ratios are fixed, so that one amplitude scales them together. */
export interface EmissionGroup {
  /** Unique within a list. */
  readonly label: string;
  /** Shared by all versions of the same lines. */
  readonly group: string;
  readonly lines: readonly GroupLine[];
}

const line = (wavelength: number, flux: number): GroupLine => ({ wavelength, flux });

/** Case B at 10,000 K and 100 cm⁻³ relative to Hβ: Storey & Hummer 1995 (MNRAS 272, 41). */
const BALMER_CASE_B: readonly GroupLine[] = [
  line(REST.hydrogenAlpha, 2.8632),
  line(REST.hydrogenBeta, 1),
  line(REST.hydrogenGamma, 0.4683),
  line(REST.hydrogenDelta, 0.2589),
  line(REST.hydrogenEpsilon, 0.159),
  line(REST.hydrogen8, 0.105),
  line(REST.hydrogen9, 0.0731),
  line(REST.hydrogen10, 0.053),
  line(REST.hydrogen11, 0.0397),
  line(REST.hydrogen12, 0.0305),
];

/**
 * Attenuation of the dusty Balmer group, A(V) magnitudes. Non-negative mixtures with the dust-free group span
 * Hα/Hβ from 2.86 to 5.7, the range seen in star-forming galaxies (common practice, no source).
 */
const DUSTY_BALMER_EXTINCTION = 2.4;

const BALMER_DUSTY = BALMER_CASE_B.map(({ wavelength, flux }) =>
  line(wavelength, flux * dustTransmission(DUSTY_BALMER_EXTINCTION * starburstAttenuation(wavelength))),
);

/** [O III] 5007/4959 = 2.98 (Storey & Zeippen 2000, MNRAS 312, 813). */
const OXYGEN3_RATIO = 2.98;
/** [N II] 6583/6548 = 3.0: between 2.94 (Froese Fischer & Tachiev 2004) and 3.05 (Storey & Zeippen 2000). */
const NITROGEN2_RATIO = 3;
/** [O II] 3729/3726 at high and at low density (Froese Fischer & Tachiev 2004; 1.5 = the statistical weights). */
const OXYGEN2_DENSE = 0.34;
const OXYGEN2_SPARSE = 1.5;
/** [S II] 6716/6731 at high and at low density (Rynkun, Gaigalas & Jönsson 2019; 1.48 at low density). */
const SULPHUR2_DENSE = 0.42;
const SULPHUR2_SPARSE = 1.48;

const doublet = (first: number, second: number, secondToFirst: number): readonly GroupLine[] => [
  line(first, 1),
  line(second, secondToFirst),
];

/**
 * Groups every width of line has. A ratio that nature varies has its two extremes as two groups: any
 * non-negative mixture has a ratio between them, so the bounds hold without a constraint.
 */
export const STRONG_GROUPS: readonly EmissionGroup[] = [
  { label: 'balmer', group: 'balmer', lines: BALMER_CASE_B },
  { label: 'balmer-dusty', group: 'balmer', lines: BALMER_DUSTY },
  {
    label: 'oxygen2-dense',
    group: 'oxygen2',
    lines: doublet(REST.oxygenII3726, REST.oxygenII3729, OXYGEN2_DENSE),
  },
  {
    label: 'oxygen2-sparse',
    group: 'oxygen2',
    lines: doublet(REST.oxygenII3726, REST.oxygenII3729, OXYGEN2_SPARSE),
  },
  {
    label: 'oxygen3',
    group: 'oxygen3',
    lines: doublet(REST.oxygenIII4959, REST.oxygenIII5007, OXYGEN3_RATIO),
  },
  {
    label: 'nitrogen2',
    group: 'nitrogen2',
    lines: doublet(REST.nitrogenII6548, REST.nitrogenII6583, NITROGEN2_RATIO),
  },
  {
    label: 'sulphur2-dense',
    group: 'sulphur2',
    lines: doublet(REST.sulphurII6731, REST.sulphurII6716, SULPHUR2_DENSE),
  },
  {
    label: 'sulphur2-sparse',
    group: 'sulphur2',
    lines: doublet(REST.sulphurII6731, REST.sulphurII6716, SULPHUR2_SPARSE),
  },
];

/**
 * Weaker lines, offered in one width only. Fixed ratios: [Ne III] 3.31, [O I] 3.13, [S III] 2.47 from
 * radiative rates (Storey & Zeippen 2000 and NIST); He I relative to 5876 at 10,000 K (from memory).
 */
export const WEAK_GROUPS: readonly EmissionGroup[] = [
  { label: 'neon3', group: 'neon3', lines: doublet(REST.neonIII3869, REST.neonIII3968, 1 / 3.31) },
  {
    label: 'helium1',
    group: 'helium1',
    lines: [
      line(REST.heliumI5876, 1),
      line(REST.heliumI6678, 0.28),
      line(REST.heliumI7065, 0.22),
      line(REST.heliumI4471, 0.37),
    ],
  },
  { label: 'oxygen1', group: 'oxygen1', lines: doublet(REST.oxygenI6300, REST.oxygenI6364, 1 / 3.13) },
  { label: 'sulphur3', group: 'sulphur3', lines: doublet(REST.sulphurIII9069, REST.sulphurIII9531, 2.47) },
  { label: 'argon3', group: 'argon3', lines: [line(REST.argonIII7136, 1)] },
  { label: 'oxygen3-auroral', group: 'oxygen3-auroral', lines: [line(REST.oxygenIII4363, 1)] },
  { label: 'helium2', group: 'helium2', lines: [line(REST.heliumII4686, 1)] },
  { label: 'carbon3', group: 'carbon3', lines: doublet(REST.carbonIII1907, REST.carbonIII1909, 0.7) },
];

/** The same groups summed for the search, where signs are free and few vectors are wanted. */
export const SEARCH_GROUPS: readonly EmissionGroup[] = [
  { label: 'balmer', group: 'balmer', lines: BALMER_CASE_B },
  { label: 'oxygen2', group: 'oxygen2', lines: doublet(REST.oxygenII3726, REST.oxygenII3729, 1.2) },
  {
    label: 'oxygen3',
    group: 'oxygen3',
    lines: doublet(REST.oxygenIII4959, REST.oxygenIII5007, OXYGEN3_RATIO),
  },
  {
    label: 'nitrogen2-sulphur2',
    group: 'nitrogen2',
    lines: [
      ...doublet(REST.nitrogenII6548, REST.nitrogenII6583, NITROGEN2_RATIO),
      line(REST.sulphurII6716, 0.8 * NITROGEN2_RATIO * 0.55),
      line(REST.sulphurII6731, 0.8 * NITROGEN2_RATIO * 0.45),
    ],
  },
];

/** Lyα of galaxies is redshifted by scattering, 360 km/s on average (Shapley et al. 2003, ApJ 588, 65). */
const LYMAN_ALPHA_SHIFT = 1 + 360 / LIGHT_SPEED_KM_S;

/** Ultraviolet lines of distant star-forming galaxies. Lyα first. */
export const DISTANT_GROUPS: readonly EmissionGroup[] = [
  {
    label: 'lyman-alpha',
    group: 'lyman-alpha',
    lines: [line(REST.hydrogenLymanAlpha * LYMAN_ALPHA_SHIFT, 1)],
  },
  { label: 'carbon4', group: 'carbon4', lines: doublet(REST.carbonIV1548, REST.carbonIV1550, 0.6) },
  {
    label: 'helium2-oxygen3',
    group: 'helium2-oxygen3',
    lines: [line(REST.heliumII1640, 1), line(REST.oxygenIII1661, 0.4), line(REST.oxygenIII1666, 1)],
  },
  { label: 'carbon3', group: 'carbon3', lines: doublet(REST.carbonIII1907, REST.carbonIII1909, 0.7) },
  { label: 'oxygen2', group: 'oxygen2', lines: doublet(REST.oxygenII3726, REST.oxygenII3729, 1.2) },
];
