import type { InputProfile } from '../../config/profile.ts';
import { InputFault } from '../errors.ts';
import { applyProfile, recognitionFromProfile } from './apply-profile.ts';
import { frameOf } from './frame.ts';
import type { FitsFile } from './fits/model.ts';
import { headersFor } from './header-text.ts';
import type { Layout } from './layout.ts';
import type { OpenedInput } from './open-input.ts';
import { recogniseImages } from './recognise-images.ts';
import { recogniseTables } from './recognise-tables.ts';
import { recogniseTargets } from './recognise-targets.ts';
import { recogniseText } from './recognise-text.ts';
import type { Recognition } from './recognition.ts';

/**
 * Decide how a file is to be read: which arrays are flux, wavelength, error and masks, how many spectra there are, and
 * which table names them. By shape, unit, UCD, generic name stems and the numbers themselves; never by the words of
 * one survey, which belong in a profile. Columns with other programs' conclusions are never among what is read.
 *
 * @param input from `openInput`
 * @param profile what a survey says about its files; overrides what was recognised
 * @returns a plain value, equal for equal input
 * @throws InputFault `layout-unknown`, `layout-ambiguous`, `wavelength-missing`, `unit-unknown`, `shape-mismatch`,
 * `too-many-pixels`, `profile-invalid`
 */
export function recogniseLayout(input: OpenedInput, profile?: InputProfile): Layout {
  const { file } = input;
  const recognition = recognitionFromProfile(file, profile) ?? recogniseForm(input);
  const { rowsPerFile } = input.limits;
  if (recognition.rowCount > rowsPerFile) {
    const detail = `a file must hold at most ${rowsPerFile} spectra (rowsPerFile), got ${recognition.rowCount}`;
    throw new InputFault('file-too-large', { file: file.label }, detail);
  }
  const frame = frameOf(headersFor(file, recognition.arms[0]!.flux.hdu));
  const targets = recogniseTargets(file, recognition);
  const missing = [...recognition.missing, ...targets.missing];
  const recognised = [...recognition.recognised, ...targets.recognised];
  if (frame.because === '') missing.push('the rest frame of the wavelengths is not stated');
  else recognised.push(`wavelengths are ${frame.frame}, says ${frame.because}`);
  const layout: Layout = {
    form: recognition.form,
    arms: recognition.arms,
    targetsHdu: targets.targetsHdu,
    ...(targets.targetColumns === null ? {} : { targetColumns: targets.targetColumns }),
    ...(targets.exposures === null ? {} : { exposures: targets.exposures }),
    rowCount: recognition.rowCount,
    frame: frame.frame,
    recognised,
    missing,
  };
  return profile === undefined ? layout : applyProfile(layout, file, profile);
}

function recogniseForm({ kind, file }: OpenedInput): Recognition {
  if (kind === 'text') return recogniseText(file);
  const images = tryImages(file);
  if (images !== null && !(images instanceof InputFault) && hasOwnArrays(images)) return images;
  const tables = recogniseTables(file);
  // A picture without wavelengths beside a table of spectra is no rival.
  if (images instanceof InputFault && tables === null) throw images;
  if (images instanceof InputFault) return tables!;
  if (images !== null && tables !== null) {
    const detail = 'the spectra must be in images or in a table, got both';
    throw new InputFault('layout-ambiguous', { file: file.label }, detail);
  }
  const found = images ?? tables;
  if (found === null) throw new InputFault('layout-unknown', { file: file.label }, contentsOf(file));
  return found;
}

function tryImages(file: FitsFile): Recognition | InputFault | null {
  try {
    return recogniseImages(file);
  } catch (error) {
    if (error instanceof InputFault) return error;
    throw error;
  }
}

/** Images with an error or a wavelength of their own are spectra whatever tables stand beside them. */
function hasOwnArrays(images: Recognition): boolean {
  return images.arms.some(({ spread, wavelength }) => spread !== null || wavelength !== null);
}

function contentsOf(file: FitsFile): string {
  const list = file.hdus.map((hdu) => `HDU ${hdu.index} ${hdu.type} '${hdu.name}'`).join(', ');
  return `an image or table must hold a flux with a wavelength, got ${list}`;
}
