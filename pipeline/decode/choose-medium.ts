import type { FitsFile } from './fits/model.ts';
import { headersFor } from './header-text.ts';
import { statedMedium } from './medium.ts';

/** The medium to read wavelengths in, and what to say about it. */
export interface MediumChoice {
  readonly medium: 'vacuum' | 'air';
  readonly recognised: readonly string[];
  readonly missing: readonly string[];
}

/**
 * Vacuum or air: what the axis type says, else names, cards and comments, else vacuum (the FITS default: an
 * axis of type WAVE is vacuum) with a sentence in `missing`. Evidence: in multi-arm stacks that say nothing the stated
 * noise peaks within 6 km/s of the vacuum positions of the night-sky lines; air positions are 82 km/s away.
 *
 * @param hdu HDU of the flux
 * @param names names and units of the wavelength array
 * @param axisMedium what the axis type says
 */
export function chooseMedium(
  file: FitsFile,
  hdu: number,
  names: readonly string[],
  axisMedium: 'vacuum' | 'air' | null,
): MediumChoice {
  if (axisMedium !== null) {
    return { medium: axisMedium, recognised: [`wavelengths in ${axisMedium} by the axis type`], missing: [] };
  }
  const stated = statedMedium(headersFor(file, hdu), names);
  if (stated !== null) {
    const sentence = `wavelengths in ${stated.medium}, says ${stated.because}`;
    return { medium: stated.medium, recognised: [sentence], missing: [] };
  }
  const sentence = 'vacuum or air is not stated: vacuum assumed (set `medium` in a profile to change it)';
  return { medium: 'vacuum', recognised: [], missing: [sentence] };
}
