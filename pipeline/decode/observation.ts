import { exposureTimeOf, exposureTimeOfParts } from './exposure-time.ts';
import type { ExposurePart, ExposureTime } from './exposure-time.ts';
import type { FitsFile, Header, TableHdu } from './fits/model.ts';
import { frameOf } from './frame.ts';
import { cardNumber, cardText, headersFor } from './header-text.ts';
import type { Layout } from './layout.ts';
import { siteOf } from './site.ts';
import { roleOf } from './target-row.ts';
import type { Role, Site } from './spectrum.ts';

/** What the headers of a file say of all its spectra. */
export interface Observation {
  readonly time: ExposureTime;
  readonly appliedCorrectionKmS: number | null;
  readonly site: Site | null;
  readonly raDeg: number | null;
  readonly decDeg: number | null;
  /** OBJECT: the target of a file with one spectrum, the field of a file with many. */
  readonly object: string | null;
  readonly exposureId: string | null;
  readonly fibre: number | null;
  readonly role: Role | null;
  readonly notes: readonly string[];
}

const EXPOSURE_ID = /^(EXP|EXPOSURE|OBS)[-_ ]?(ID|NUM|NO)$/;
const FIBRE = /^FIB(RE|ER)[-_ ]?(ID|NUM|NO)?$/;
const OBJECT_NAME = /^OBJECT$|^OBJ(ECT)?[-_ ]?NAME$|^TARG(ET)?[-_ ]?(NAME|ID)$/;
const ROLE = /^FIB(RE|ER)?[-_ ]?TYPE?$|^(OBJ|OBJECT|TARGET)[-_ ]?TYPE$|^ROLE$/;

/**
 * Read what standard cards and cards with generic stems say of the observation.
 *
 * @param layout the layout's frame and site overrule the headers
 */
export function observationOf(file: FitsFile, layout: Layout): Observation {
  const headers = headersFor(file, layout.arms[0]!.flux.hdu);
  const time = exposureTimeOf(headers);
  const frame = frameOf(headers);
  const site = siteOf(headers);
  const notes = [...time.notes];
  if (layout.site === undefined && site !== null) notes.push(...site.notes);
  const [raDeg, decDeg] = positionOf(headers);
  const fibre = firstNumber(headers, FIBRE);
  const isCorrected = layout.frame === 'heliocentric' || layout.frame === 'barycentric';
  const role = firstText(headers, ROLE);
  return {
    time,
    appliedCorrectionKmS: isCorrected ? frame.appliedCorrectionKmS : null,
    site: layout.site ?? site?.site ?? null,
    raDeg,
    decDeg,
    object: firstText(headers, OBJECT_NAME),
    exposureId: firstText(headers, EXPOSURE_ID),
    fibre: fibre !== null && Number.isInteger(fibre) ? fibre : null,
    role: role === null ? null : roleOf(role),
    notes,
  };
}

/**
 * Times of one spectrum from the table of exposures.
 *
 * @param targetName value of the column that the table shares with the targets
 * @returns null when there is no such table, or the spectrum is not in it
 */
export function exposuresOf(file: FitsFile, layout: Layout, targetName: string | null): ExposureTime | null {
  const { exposures } = layout;
  if (exposures === undefined || targetName === null) return null;
  const table = file.hdus.find((hdu): hdu is TableHdu => hdu.index === exposures.hdu && hdu.type === 'table');
  if (table === undefined) return null;
  const at = (name: string): number => table.columns.findIndex((column) => column.name === name);
  const nameColumn = at(exposures.targetColumn);
  const names = /^[BIJK]$/.test(table.columns[nameColumn]!.code)
    ? table.readIntegers(nameColumn, 0, table.rowCount).map(String)
    : table.readStrings(nameColumn, 0, table.rowCount);
  const mjds = table.readNumbers(at(exposures.mjdColumn), 0, table.rowCount);
  const durations =
    exposures.durationColumn === null
      ? null
      : table.readNumbers(at(exposures.durationColumn), 0, table.rowCount);
  const parts = names.flatMap((name, row): ExposurePart[] => {
    const mjd = mjds[row]!;
    const durationS = durations?.[row] ?? NaN;
    if (name.trim() !== targetName || !Number.isFinite(mjd)) return [];
    return [{ mjd, durationS: Number.isFinite(durationS) && durationS > 0 ? durationS : null }];
  });
  return parts.length === 0 ? null : exposureTimeOfParts(parts);
}

/**
 * Position of the target: a pair of cards that end in RA and DEC and are not the plain pair (which may be where the
 * telescope pointed) comes first where there is exactly one such pair.
 */
function positionOf(headers: readonly Header[]): readonly [number | null, number | null] {
  for (const header of headers) {
    const stems = header
      .keys()
      .filter((key) => /[-_]RA$/.test(key) && cardNumber(header, key) !== null)
      .map((key) => key.slice(0, -2))
      .filter((stem) => cardNumber(header, `${stem}DEC`) !== null);
    const stem = stems.length === 1 ? stems[0]! : '';
    const ra = cardNumber(header, `${stem}RA`);
    const dec = cardNumber(header, `${stem}DEC`);
    if (ra !== null && dec !== null && ra >= 0 && ra <= 360 && Math.abs(dec) <= 90) return [ra, dec];
  }
  return [null, null];
}

function firstText(headers: readonly Header[], stem: RegExp): string | null {
  for (const header of headers) {
    for (const key of header.keys()) {
      if (!stem.test(key)) continue;
      const value = header.get(key);
      const words =
        cardText(header, key) ||
        (typeof value === 'number' || typeof value === 'bigint' ? String(value) : '');
      if (words !== '') return words;
    }
  }
  return null;
}

function firstNumber(headers: readonly Header[], stem: RegExp): number | null {
  for (const header of headers) {
    for (const key of header.keys()) {
      const value = stem.test(key) ? cardNumber(header, key) : null;
      if (value !== null) return value;
    }
  }
  return null;
}
