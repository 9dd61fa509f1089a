/** Modified Julian Date of 2000-01-01 00:00 UTC. */
const MJD_2000 = 51_544;
/** Days in four hundred Gregorian years, and in the parts of them. */
const DAYS = { fourCenturies: 146_097, century: 36_524, fourYears: 1461, year: 365 } as const;

/**
 * A Modified Julian Date as ISO 8601 UTC with milliseconds and without a zone letter, as FITS writes it
 * (FITS 4.0, section 9.1.1). Leap seconds are not shown. Gregorian calendar, years 1 to 9999.
 */
export function isoFromMjd(mjd: number): string {
  const milliseconds = Math.round((mjd - Math.floor(mjd)) * 86_400_000);
  const day = Math.floor(mjd) + Math.floor(milliseconds / 86_400_000);
  const rest = milliseconds % 86_400_000;
  const pad = (value: number, width: number): string => String(value).padStart(width, '0');
  const clock = [
    pad(Math.floor(rest / 3_600_000), 2),
    pad(Math.floor(rest / 60_000) % 60, 2),
    `${pad(Math.floor(rest / 1000) % 60, 2)}.${pad(rest % 1000, 3)}`,
  ].join(':');
  return `${isoDate(day)}T${clock}`;
}

/** The date of a whole Modified Julian Date, `YYYY-MM-DD`. */
export function isoDate(day: number): string {
  // Counted from 1 March of the year 2000, so that the leap day is the last of its four hundred years.
  let left = day - (MJD_2000 + 60);
  const cycles = Math.floor(left / DAYS.fourCenturies);
  left -= cycles * DAYS.fourCenturies;
  const centuries = Math.min(3, Math.floor(left / DAYS.century));
  left -= centuries * DAYS.century;
  const fours = Math.floor(left / DAYS.fourYears);
  left -= fours * DAYS.fourYears;
  const years = Math.min(3, Math.floor(left / DAYS.year));
  left -= years * DAYS.year;
  // Months from March on have 31, 30, 31, 30, 31 days, twice over: (5 days + 2) / 153 counts them.
  const month = Math.floor((5 * left + 2) / 153);
  const dayOfMonth = left - Math.floor((153 * month + 2) / 5) + 1;
  const march = 2000 + 400 * cycles + 100 * centuries + 4 * fours + years;
  const [year, calendarMonth] = month < 10 ? [march, month + 3] : [march + 1, month - 9];
  return `${year}-${String(calendarMonth).padStart(2, '0')}-${String(dayOfMonth).padStart(2, '0')}`;
}
