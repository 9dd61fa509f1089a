/** Modified Julian Date of 1970-01-01 (the Unix epoch). */
const MJD_OF_UNIX_EPOCH = 40_587;
const MS_PER_DAY = 86_400_000;

/**
 * Days from 1970-01-01 to a date of the Gregorian calendar (Hinnant 2013, `days_from_civil`).
 *
 * @param year full year
 * @param month 1..12
 * @param day 1..31
 */
function daysFromCivil(year: number, month: number, day: number): number {
  const shifted = month <= 2 ? year - 1 : year;
  const era = Math.floor(shifted / 400);
  const yearOfEra = shifted - era * 400;
  const dayOfYear = Math.floor((153 * (month + (month > 2 ? -3 : 9)) + 2) / 5) + day - 1;
  const dayOfEra = yearOfEra * 365 + Math.floor(yearOfEra / 4) - Math.floor(yearOfEra / 100) + dayOfYear;
  return era * 146_097 + dayOfEra - 719_468;
}

/** The inverse (Hinnant 2013, `civil_from_days`). */
function civilFromDays(days: number): { year: number; month: number; day: number } {
  const shifted = days + 719_468;
  const era = Math.floor(shifted / 146_097);
  const dayOfEra = shifted - era * 146_097;
  const yearOfEra = Math.floor(
    (dayOfEra -
      Math.floor(dayOfEra / 1_460) +
      Math.floor(dayOfEra / 36_524) -
      Math.floor(dayOfEra / 146_096)) /
      365,
  );
  const dayOfYear = dayOfEra - (365 * yearOfEra + Math.floor(yearOfEra / 4) - Math.floor(yearOfEra / 100));
  const monthIndex = Math.floor((5 * dayOfYear + 2) / 153);
  const month = monthIndex < 10 ? monthIndex + 3 : monthIndex - 9;
  return {
    year: yearOfEra + era * 400 + (month <= 2 ? 1 : 0),
    month,
    day: dayOfYear - Math.floor((153 * monthIndex + 2) / 5) + 1,
  };
}

/**
 * Modified Julian Date of an ISO 8601 text, or of the older `dd/mm/yy` of FITS (years 1900-1999).
 *
 * @param text `2031-04-02T03:04:05.6`, a trailing Z allowed; a date alone means its midnight
 * @returns null when the text is no date
 */
export function mjdOfIsoDate(text: string): number | null {
  const old = /^(\d\d)\/(\d\d)\/(\d\d)$/.exec(text.trim());
  if (old !== null)
    return daysFromCivil(1900 + Number(old[3]), Number(old[2]), Number(old[1])) + MJD_OF_UNIX_EPOCH;
  const found = /^(\d{4})-(\d{1,2})-(\d{1,2})(?:[T ](\d{1,2}):(\d{1,2})(?::(\d{1,2}(?:\.\d*)?))?)?Z?$/.exec(
    text.trim(),
  );
  if (found === null) return null;
  const [year, month, day, hour, minute, second] = found
    .slice(1)
    .map((part: string | undefined) => Number(part ?? 0));
  if (month! < 1 || month! > 12 || day! < 1 || day! > 31) return null;
  const fraction = (hour! + (minute! + second! / 60) / 60) / 24;
  return daysFromCivil(year!, month!, day!) + MJD_OF_UNIX_EPOCH + fraction;
}

/**
 * ISO 8601 UTC text of a Modified Julian Date, to the millisecond.
 *
 * @param mjd finite
 */
export function isoDateOfMjd(mjd: number): string {
  const totalMs = Math.round((mjd - MJD_OF_UNIX_EPOCH) * MS_PER_DAY);
  const days = Math.floor(totalMs / MS_PER_DAY);
  const { year, month, day } = civilFromDays(days);
  const ms = totalMs - days * MS_PER_DAY;
  const pad = (value: number, width: number): string => String(value).padStart(width, '0');
  const clock = [ms / 3_600_000, (ms / 60_000) % 60, (ms / 1_000) % 60].map((part) =>
    pad(Math.floor(part), 2),
  );
  return `${pad(year, 4)}-${pad(month, 2)}-${pad(day, 2)}T${clock.join(':')}.${pad(ms % 1_000, 3)}Z`;
}
