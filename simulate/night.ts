import { expose, type Exposure, type ExposureConditions, type ObserverVelocity } from './exposure.ts';
import { FIBRES } from './instrument/curlew.ts';
import type { Makers } from './sources/makers.ts';
import { isoDate } from './survey/calendar.ts';
import { type Field, makeField } from './survey/field.ts';
import { airmassAt } from './survey/harrow-fell.ts';

/** How much to simulate. */
export interface SurveyParameters {
  /** Whole number; the same seed gives the same bytes. */
  readonly seed: number;
  /** Observing nights, ≥ 1. */
  readonly nights: number;
  /** Fields per night, 1 to {@link MOST_FIELDS}; each is exposed {@link EXPOSURES_PER_FIELD} times. */
  readonly fields: number;
  /** Fibres per field, 1 to 240. */
  readonly fibres: number;
}

export const DEFAULT_SURVEY: SurveyParameters = { seed: 20310402, nights: 1, fields: 1, fibres: FIBRES };
export const EXPOSURES_PER_FIELD = 3;
/** An autumn night has room for five fields at three half hours each, with their calibrations between. */
export const MOST_FIELDS = 5;

/** One exposure of a night, and the file it belongs in. */
export interface NightExposure {
  /** Observing date, `YYYY-MM-DD`, that of the evening. */
  readonly night: string;
  /** Within the night's folder. */
  readonly file: string;
  readonly exposure: Exposure;
  /** Share of the file's bytes to keep; below 1 for a file that broke off. */
  readonly keep: number;
}

/** 2031-04-02, the first night. */
const FIRST_NIGHT_MJD = 62_958;
/** The first exposure begins at 23:05 UTC, two hours after sunset at Harrow Fell. */
const FIRST_START_DAY = (23 * 60 + 5) / 1440;
const EXPOSURE_S = 1800;
/** Between exposures of a field the telescope turns to standards; this makes their airmasses differ. */
const EXPOSURE_SPACING_DAY = 72 / 1440;
/** Fields are taken one after the other, each 30 degrees further east and so two hours later. */
const FIELD_SPACING_DAY = 120 / 1440;
/** The exposure that broke off while it was written, and how much of it there is. */
const BROKEN_OFF_SHARE = 0.37;

/**
 * A whole survey of practice nights, one exposure at a time, since one takes tens of megabytes. Each night
 * ends with an exposure whose file broke off.
 *
 * @param makers of the objects, from `makersFrom`
 * @param observerVelocity of Harrow Fell
 * @throws RangeError when a parameter is out of its range
 */
export function* simulateNights(
  parameters: SurveyParameters,
  makers: Makers,
  observerVelocity: ObserverVelocity,
): Generator<NightExposure, void> {
  requireWhole('nights', parameters.nights, 1, 1000);
  requireWhole('fields', parameters.fields, 1, MOST_FIELDS);
  requireWhole('fibres', parameters.fibres, 1, FIBRES);
  for (let n = 0; n < parameters.nights; n++) {
    const day = FIRST_NIGHT_MJD + n;
    const night = isoDate(day);
    let count = 0;
    const exposureOf = (field: Field, m: number, e: number, keep: number): NightExposure => {
      count++;
      const midMjd =
        day + FIRST_START_DAY + m * FIELD_SPACING_DAY + e * EXPOSURE_SPACING_DAY + EXPOSURE_S / 2 / 86_400;
      const conditions: ExposureConditions = {
        id: `${night}-${String(count).padStart(2, '0')}`,
        number: n * 100 + count,
        midMjd,
        exposureS: EXPOSURE_S,
        airmass: airmassAt(midMjd, field.raDeg, field.decDeg),
      };
      const exposure = expose(parameters.seed, field, conditions, observerVelocity);
      return { night, file: `exposure-${String(count).padStart(2, '0')}.fits`, exposure, keep };
    };
    for (let m = 0; m < parameters.fields; m++) {
      const field = makeField(parameters.seed, n * parameters.fields + m, parameters.fibres, makers);
      for (let e = 0; e < EXPOSURES_PER_FIELD; e++) yield exposureOf(field, m, e, 1);
      if (m === parameters.fields - 1) yield exposureOf(field, m, EXPOSURES_PER_FIELD, BROKEN_OFF_SHARE);
    }
  }
}

function requireWhole(name: string, value: number, least: number, most: number): void {
  if (!Number.isInteger(value) || value < least || value > most) {
    throw new RangeError(`${name} must be a whole number from ${least} to ${most}, got ${value}`);
  }
}
