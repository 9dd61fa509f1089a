import type { InputProfile, ProfileArm, ProfileArray } from '../../config/profile.ts';
import { InputFault } from '../errors.ts';
import { chooseMedium } from './choose-medium.ts';
import type { FitsFile, Hdu } from './fits/model.ts';
import { fluxPerOf } from './flux-unit.ts';
import { cardText } from './header-text.ts';
import type { ArmLayout, ArraySource, Layout, TargetColumns } from './layout.ts';
import { lineSpreadMeaningOf } from './line-spread-meaning.ts';
import { readArray } from './read-array.ts';
import type { Recognition } from './recognition.ts';
import { wavelengthUnitOfArray } from './wavelength/wavelength-unit-of-array.ts';
import { parseWavelengthUnit } from './wavelength/wavelength-unit.ts';

/**
 * The arms as a profile states them.
 *
 * @returns null when the profile is absent or names no arms: they are then recognised
 * @throws InputFault `profile-invalid` when it names what the file does not have
 */
export function recognitionFromProfile(file: FitsFile, profile?: InputProfile): Recognition | null {
  if (profile?.arms === undefined) return null;
  const first = profile.arms[0]!;
  const flux = sourceOf(file, first.flux, 'arms.0.flux');
  const hdu = hduOf(file, flux.hdu, 'arms.0.flux.hdu');
  const form = profile.form ?? formOf(file, hdu, flux);
  const rowCount = spectraIn(form, hdu);
  const arms = profile.arms.map((arm, i) => armFromProfile(file, arm, `arms.${i}`, rowCount));
  return {
    form,
    arms,
    rowCount,
    recognised: [`${rowCount} spectra in ${arms.length} arm(s), as the profile '${profile.name}' says`],
    missing: arms
      .filter(({ spread }) => spread === null)
      .map(() => 'no error in the profile: noise will be estimated'),
  };
}

/** Let the profile's medium, frame, site, resolving power and targets stand in for what was recognised. */
export function applyProfile(layout: Layout, file: FitsFile, profile: InputProfile): Layout {
  const said = `as the profile '${profile.name}' says`;
  const { medium, frame, targets } = profile;
  const isSettled = (sentence: string): boolean =>
    (medium !== undefined && sentence.startsWith('vacuum or air is not stated')) ||
    (frame !== undefined && sentence.startsWith('the rest frame')) ||
    (targets !== undefined && sentence.startsWith('no table names'));
  return {
    ...layout,
    arms: medium === undefined ? layout.arms : layout.arms.map((arm) => ({ ...arm, medium })),
    frame: frame ?? layout.frame,
    ...(profile.site === undefined ? {} : { site: profile.site }),
    ...(profile.resolvingPower === undefined ? {} : { resolvingPower: profile.resolvingPower }),
    ...(targets === undefined ? {} : targetsFromProfile(file, targets)),
    recognised: [
      ...layout.recognised,
      ...(medium === undefined ? [] : [`wavelengths in ${medium}, ${said}`]),
      ...(frame === undefined ? [] : [`wavelengths are ${frame}, ${said}`]),
    ],
    missing: layout.missing.filter((sentence) => !isSettled(sentence)),
  };
}

function armFromProfile(file: FitsFile, arm: ProfileArm, key: string, rowCount: number): ArmLayout {
  const optional = (array: ProfileArray | undefined, part: string): ArraySource | null =>
    array === undefined ? null : sourceOf(file, { hdu: arm.flux.hdu, ...array }, `${key}.${part}`);
  const flux = sourceOf(file, arm.flux, `${key}.flux`);
  const wavelength = optional(arm.wavelength, 'wavelength');
  const spread = optional(arm.spread, 'spread');
  const lineSpread = optional(arm.lineSpread, 'lineSpread');
  if (spread !== null && arm.spreadMeaning === undefined) {
    throw invalid(file, `${key}.spreadMeaning must say what the spread is, got nothing`);
  }
  const unit = wavelength === null ? null : wavelengthUnit(file, arm, wavelength, key, rowCount);
  const meaning =
    lineSpread === null
      ? undefined
      : (arm.lineSpreadMeaning ??
        lineSpreadMeaningOf(
          nameOf(file, lineSpread),
          unitOf(file, lineSpread),
          readArray(file, lineSpread, 0, rowCount),
        ));
  if (meaning === null)
    throw invalid(file, `${key}.lineSpreadMeaning must say what the line spread is, got nothing`);
  return {
    name: arm.name,
    wavelength,
    wavelengthMeaning: unit?.meaning ?? 'linear',
    wavelengthUnitAngstrom: unit?.angstrom ?? 1,
    medium: chooseMedium(file, flux.hdu, wavelength === null ? [] : [nameOf(file, wavelength)], null).medium,
    flux,
    fluxPer: fluxPerOf(unitOf(file, flux)),
    spread,
    spreadMeaning: spread === null ? 'none' : arm.spreadMeaning!,
    quality: arm.quality.map((array, i) =>
      sourceOf(file, { hdu: arm.flux.hdu, ...array }, `${key}.quality.${i}`),
    ),
    qualityBadWhen: arm.qualityBadWhen,
    sky: optional(arm.sky, 'sky'),
    lineSpread,
    lineSpreadMeaning: meaning ?? 'sigma-pixel',
  };
}

function wavelengthUnit(file: FitsFile, arm: ProfileArm, source: ArraySource, key: string, rowCount: number) {
  if (arm.wavelengthUnit !== undefined) {
    const unit = parseWavelengthUnit(arm.wavelengthUnit);
    if (unit === null)
      throw invalid(file, `${key}.wavelengthUnit must be a length, got '${arm.wavelengthUnit}'`);
    return unit;
  }
  const values = readArray(file, source, 0, rowCount);
  return wavelengthUnitOfArray(nameOf(file, source), unitOf(file, source), values, { file: file.label });
}

function formOf(file: FitsFile, hdu: Hdu, flux: ArraySource): Layout['form'] {
  if (hdu.type === 'image')
    return flux.imageRow === null && hdu.rowCount > 1 ? 'row-stack' : 'image-one-spectrum';
  if (hdu.type === 'other') throw invalid(file, `HDU ${hdu.index} must be an image or a table, got neither`);
  const column = hdu.columns.find(({ name }) => name === flux.column);
  return column?.repeat === 1 ? 'table-row-per-pixel' : 'table-row-per-spectrum';
}

function spectraIn(form: Layout['form'], hdu: Hdu): number {
  const holdsMany = form === 'row-stack' || form === 'table-row-per-spectrum';
  return holdsMany && hdu.type !== 'other' ? hdu.rowCount : 1;
}

function targetsFromProfile(
  file: FitsFile,
  targets: NonNullable<InputProfile['targets']>,
): Pick<Layout, 'targetsHdu' | 'targetColumns'> {
  const { hdu: wanted, ...columns } = targets;
  const hdu = hduOf(file, wanted, 'targets.hdu');
  if (hdu.type !== 'table') throw invalid(file, `targets.hdu must be a table, got ${hdu.type}`);
  const named = (part: keyof TargetColumns): string | null => {
    const name = columns[part];
    if (name === undefined) return null;
    const found = hdu.columns.find((column) => column.name.toLowerCase() === name.toLowerCase());
    if (found === undefined)
      throw invalid(file, `targets.${part} must be a column of HDU ${hdu.index}, got '${name}'`);
    return found.name;
  };
  return {
    targetsHdu: hdu.index,
    targetColumns: {
      name: named('name'),
      ra: named('ra'),
      dec: named('dec'),
      fibre: named('fibre'),
      role: named('role'),
      targetClass: named('targetClass'),
      magnitude: named('magnitude'),
      magnitudeBand: named('magnitudeBand'),
    },
  };
}

/** A profile's array as a source; names are matched without regard to case. */
function sourceOf(file: FitsFile, array: ProfileArray, key: string): ArraySource {
  const hdu = hduOf(file, array.hdu ?? 0, `${key}.hdu`);
  if (array.column === undefined) return { hdu: hdu.index, column: null, imageRow: array.row ?? null };
  if (hdu.type !== 'table')
    throw invalid(file, `${key} must be in a table, got HDU ${hdu.index} (${hdu.type})`);
  const { column } = array;
  const found =
    typeof column === 'number'
      ? hdu.columns[column - 1]
      : hdu.columns.find(({ name }) => name.toLowerCase() === column.toLowerCase());
  if (found === undefined) throw invalid(file, `${key}.column must be in HDU ${hdu.index}, got '${column}'`);
  return { hdu: hdu.index, column: found.name, imageRow: null };
}

function hduOf(file: FitsFile, wanted: number | string, key: string): Hdu {
  const found = file.hdus.find(({ index, name }) =>
    typeof wanted === 'number' ? index === wanted : name.toLowerCase() === wanted.toLowerCase(),
  );
  if (found === undefined) throw invalid(file, `${key} must be an HDU of the file, got '${wanted}'`);
  return found;
}

function nameOf(file: FitsFile, source: ArraySource): string {
  return source.column ?? hduOf(file, source.hdu, 'hdu').name;
}

function unitOf(file: FitsFile, source: ArraySource): string {
  const hdu = hduOf(file, source.hdu, 'hdu');
  if (hdu.type !== 'table') return cardText(hdu.header, 'BUNIT');
  return hdu.columns.find(({ name }) => name === source.column)?.unit ?? '';
}

function invalid(file: FitsFile, detail: string): InputFault {
  return new InputFault('profile-invalid', { file: file.label }, detail);
}
