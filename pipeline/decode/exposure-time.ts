import { isoDateOfMjd, mjdOfIsoDate } from './calendar.ts';
import type { Header } from './fits/model.ts';
import { cardNumber, cardText } from './header-text.ts';

const SECONDS_PER_DAY = 86_400;
/** Two exposures further apart belong to different nights: no night lasts longer than this. */
const LONGEST_NIGHT_DAYS = 0.7;

/** When a spectrum was taken. */
export interface ExposureTime {
  /** Middle of the exposure, ISO 8601 UTC. */
  readonly observedAt: string | null;
  readonly exposureS: number | null;
  readonly coaddedOverNights: boolean;
  readonly notes: readonly string[];
}

/** One exposure that went into a spectrum. */
export interface ExposurePart {
  readonly mjd: number;
  readonly durationS: number | null;
}

/**
 * Middle and length of an exposure from standard cards (FITS time paper, Rots et al. 2015): MJD-AVG or DATE-AVG,
 * else begin and end, else begin plus half the exposure time. A card about MJD that lists several dates tells
 * a co-add over nights.
 *
 * @param headers nearest first
 */
export function exposureTimeOf(headers: readonly Header[]): ExposureTime {
  const notes: string[] = [];
  const first = <T>(read: (header: Header) => T | null): T | null => {
    for (const header of headers) {
      const value = read(header);
      if (value !== null) return value;
    }
    return null;
  };
  const instant = (suffix: string): number | null =>
    first(
      (header) => cardNumber(header, `MJD-${suffix}`) ?? mjdOfIsoDate(cardText(header, `DATE-${suffix}`)),
    );
  const exposureS = first(
    (header) =>
      cardNumber(header, 'XPOSURE') ?? cardNumber(header, 'EXPTIME') ?? cardNumber(header, 'EXPOSURE'),
  );
  const scale = first((header) => cardText(header, 'TIMESYS') || null);
  const coaddedOverNights = headers.some(listsSeveralNights);
  const observed = instant('OBS');
  const begin = instant('BEG') ?? observed;
  const end = instant('END');
  const isOutside =
    observed !== null && begin !== null && end !== null && (observed < begin || observed > end);
  if (isOutside) {
    notes.push('DATE-OBS lies outside begin and end, which may be local time: DATE-OBS is used');
  }
  const middle =
    instant('AVG') ??
    (begin !== null && end !== null && end >= begin && !isOutside ? (begin + end) / 2 : null) ??
    plusHalf(isOutside ? observed : begin, exposureS);
  if (middle !== null && scale !== null && scale.toUpperCase() !== 'UTC') {
    notes.push(`times are in ${scale}, read as UTC (a minute off at most: below 0.001 km/s)`);
  }
  return {
    observedAt: middle === null ? null : isoDateOfMjd(middle),
    exposureS,
    coaddedOverNights,
    notes,
  };
}

/**
 * The same from a list of exposures of one spectrum: the middle is weighted by their lengths.
 *
 * @param parts at least one
 */
export function exposureTimeOfParts(parts: readonly ExposurePart[]): ExposureTime {
  let weight = 0;
  let sum = 0;
  let total = 0;
  for (const { mjd, durationS } of parts) {
    weight += durationS ?? 1;
    sum += (mjd + (durationS ?? 0) / 2 / SECONDS_PER_DAY) * (durationS ?? 1);
    total += durationS ?? 0;
  }
  const days = parts.map(({ mjd }) => mjd);
  return {
    observedAt: isoDateOfMjd(sum / weight),
    exposureS: total > 0 ? total : null,
    coaddedOverNights: Math.max(...days) - Math.min(...days) > LONGEST_NIGHT_DAYS,
    notes: [`made from ${parts.length} exposures`],
  };
}

function plusHalf(beginMjd: number | null, exposureS: number | null): number | null {
  return beginMjd === null ? null : beginMjd + (exposureS ?? 0) / 2 / SECONDS_PER_DAY;
}

/** A text card named after MJD that holds two or more different five-digit days. */
function listsSeveralNights(header: Header): boolean {
  return header.keys().some((key) => {
    if (!key.includes('MJD')) return false;
    const days = new Set(cardText(header, key).match(/\b\d{5}\b/g) ?? []);
    return days.size > 1;
  });
}
