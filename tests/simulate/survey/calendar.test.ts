import { expect, it } from 'vitest';
import { isoDate, isoFromMjd } from '../../../simulate/survey/calendar.ts';

const DAY_MS = 86_400_000;
/** 1970-01-01 is MJD 40587. */
const MJD_OF_1970 = 40_587;

it('isoDate() agrees with the calendar of the language on every 17th day from 1601 to 2400', () => {
  const first = Date.UTC(1601, 0, 1) / DAY_MS;
  const last = Date.UTC(2400, 11, 31) / DAY_MS;
  for (let day = first; day <= last; day += 17) {
    expect(isoDate(day + MJD_OF_1970)).toBe(new Date(day * DAY_MS).toISOString().slice(0, 10));
  }
});

it.each(['1899-12-31', '1900-02-28', '1900-03-01', '2000-02-29', '2028-02-29', '2031-04-02'])(
  'isoDate() knows %s',
  (date) => {
    expect(isoDate(Date.parse(`${date}T00:00:00Z`) / DAY_MS + MJD_OF_1970)).toBe(date);
  },
);

it('isoFromMjd() rounds to milliseconds and carries into the next day', () => {
  expect(isoFromMjd(62_958.5)).toBe('2031-04-02T12:00:00.000');
  expect(isoFromMjd(62_958 + (23 * 3600 + 59 * 60 + 59.9996) / 86_400)).toBe('2031-04-03T00:00:00.000');
});
