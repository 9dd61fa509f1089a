import type { Header } from './fits/model.ts';
import { cardNumber, cardText } from './header-text.ts';
import type { Frame } from './spectrum.ts';

/** The Earth's orbit and rotation reach 30.8 km/s together; a card beyond that holds something else. */
const LARGEST_CORRECTION_KM_S = 32;

/** FITS paper III, table 13: reference frames this program can take to the barycentre. */
const FRAME_OF_SPECSYS: Readonly<Record<string, Frame>> = {
  TOPOCENT: 'topocentric',
  GEOCENTR: 'geocentric',
  HELIOCEN: 'heliocentric',
  BARYCENT: 'barycentric',
};

/** Where the wavelengths are at rest, and what says so. */
export interface FrameReading {
  readonly frame: Frame;
  /** Size of a correction that is already in the wavelengths, km/s. */
  readonly appliedCorrectionKmS: number | null;
  /** Empty when nothing was found. */
  readonly because: string;
}

/**
 * The rest frame of the wavelengths: SPECSYS with VELOSYS (m/s), else cards whose keywords begin with HELIO or
 * BARY. A stated size of such a correction is read as a correction that was made, because a spectrum that
 * carries none has no reason to state it; SPECSYS, when present, overrules.
 *
 * @param headers nearest first
 */
export function frameOf(headers: readonly Header[]): FrameReading {
  const stem = frameByStem(headers);
  for (const header of headers) {
    const system = cardText(header, 'SPECSYS').toUpperCase();
    if (system === '') continue;
    const frame = FRAME_OF_SPECSYS[system] ?? 'unknown';
    const velocity = cardNumber(header, 'VELOSYS');
    const isCorrected = frame === 'barycentric' || frame === 'heliocentric';
    const stated = velocity === null ? (stem?.appliedCorrectionKmS ?? null) : velocity / 1_000;
    return {
      frame,
      appliedCorrectionKmS: isCorrected ? stated : null,
      because: `SPECSYS = '${system}'`,
    };
  }
  return stem ?? { frame: 'unknown', appliedCorrectionKmS: null, because: '' };
}

function frameByStem(headers: readonly Header[]): FrameReading | null {
  let flagged: FrameReading | null = null;
  for (const header of headers) {
    for (const key of header.keys()) {
      const stem = /^(HELIO|BARY)/.exec(key)?.[1];
      if (stem === undefined) continue;
      const frame = stem === 'HELIO' ? 'heliocentric' : 'barycentric';
      const value = header.get(key);
      if (typeof value === 'boolean') {
        const because = `the card ${key}`;
        flagged ??= { frame: value ? frame : 'topocentric', appliedCorrectionKmS: null, because };
        continue;
      }
      const size = cardNumber(header, key);
      if (size === null || Math.abs(size) > LARGEST_CORRECTION_KM_S || /JD|DATE|TIME/.test(key)) continue;
      if (flagged?.frame === 'topocentric') return flagged;
      return { frame, appliedCorrectionKmS: size, because: `the card ${key}, read as already applied` };
    }
  }
  return flagged;
}
