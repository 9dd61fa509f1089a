import type { Kind } from '../../templates/family.ts';

/** A line worth marking in a plot. */
export interface LandmarkLine {
  readonly label: string;
  /** Vacuum, rest frame, ångström. */
  readonly wavelength: number;
  readonly kinds: readonly Kind[];
}

/**
 * The lines people look for first, for marks in a plot only: nothing is measured with them. Vacuum wavelengths:
 * forbidden lines from the NIST energy levels, hydrogen as line-strength weighted centroids of the Dirac levels,
 * ultraviolet resonance lines from Morton (2003, ApJS 149, 205); blends as the mean of their members.
 */
export const LANDMARK_LINES: readonly LandmarkLine[] = [
  { label: 'Lyα', wavelength: 1215.67, kinds: ['quasar'] },
  { label: 'Si IV', wavelength: 1396.76, kinds: ['quasar'] },
  { label: 'C IV', wavelength: 1549.06, kinds: ['quasar'] },
  { label: 'C III]', wavelength: 1908.73, kinds: ['quasar'] },
  { label: 'Mg II', wavelength: 2799.12, kinds: ['quasar', 'galaxy'] },
  { label: '[O II]', wavelength: 3728.48, kinds: ['galaxy', 'quasar'] },
  { label: '[Ne III]', wavelength: 3869.86, kinds: ['galaxy'] },
  { label: 'Ca K', wavelength: 3934.78, kinds: ['galaxy', 'star'] },
  { label: 'Ca H', wavelength: 3969.59, kinds: ['galaxy', 'star'] },
  { label: 'Hδ', wavelength: 4102.89, kinds: ['star', 'galaxy'] },
  { label: 'G band', wavelength: 4305.6, kinds: ['galaxy', 'star'] },
  { label: 'Hγ', wavelength: 4341.68, kinds: ['star', 'galaxy', 'quasar'] },
  { label: 'Hβ', wavelength: 4862.68, kinds: ['galaxy', 'quasar', 'star'] },
  { label: '[O III]', wavelength: 4960.3, kinds: ['galaxy', 'quasar'] },
  { label: '[O III]', wavelength: 5008.24, kinds: ['galaxy', 'quasar'] },
  { label: 'Mg b', wavelength: 5176.6, kinds: ['galaxy', 'star'] },
  { label: 'Na D', wavelength: 5894.57, kinds: ['galaxy', 'star'] },
  { label: '[N II]', wavelength: 6549.86, kinds: ['galaxy'] },
  { label: 'Hα', wavelength: 6564.61, kinds: ['galaxy', 'quasar', 'star'] },
  { label: '[N II]', wavelength: 6585.27, kinds: ['galaxy'] },
  { label: '[S II]', wavelength: 6718.29, kinds: ['galaxy'] },
  { label: '[S II]', wavelength: 6732.67, kinds: ['galaxy'] },
  { label: 'TiO', wavelength: 7055.9, kinds: ['star'] },
  { label: 'Ca II', wavelength: 8500.35, kinds: ['star', 'galaxy'] },
  { label: 'Ca II', wavelength: 8544.44, kinds: ['star', 'galaxy'] },
  { label: 'Ca II', wavelength: 8664.52, kinds: ['star', 'galaxy'] },
];
