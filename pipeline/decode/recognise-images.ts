import { InputFault } from '../errors.ts';
import type { FaultPlace } from '../errors.ts';
import { armOfName, kindOfArray } from './array-kind.ts';
import type { ArrayKind } from './array-kind.ts';
import { armOfFewRows, fewRowsOf, MOST_ROWS_OF_ONE_SPECTRUM } from './few-rows.ts';
import type { FitsFile, ImageHdu } from './fits/model.ts';
import { fluxPerOf } from './flux-unit.ts';
import { cardText, headersFor } from './header-text.ts';
import type { ArmLayout, SpreadMeaning } from './layout.ts';
import { lineSpreadMeaningOf } from './line-spread-meaning.ts';
import { chooseMedium } from './choose-medium.ts';
import { imageArray } from './recognition.ts';
import type { Recognition } from './recognition.ts';
import { spectralAxisOf } from './wavelength/spectral-axis-of.ts';
import { wavelengthUnitOfArray } from './wavelength/wavelength-unit-of-array.ts';

interface NamedImage {
  readonly image: ImageHdu;
  readonly kind: ArrayKind | null;
  readonly arm: string;
}

/**
 * Recognise spectra in image HDUs: one image (1-D, a stack of rows, or the few arrays of one spectrum), or named
 * images with a flux, an error and so on per arm, where a shared prefix or suffix names the arm.
 *
 * @returns null when no image can be a flux
 * @throws InputFault `layout-ambiguous`, `wavelength-missing`, `shape-mismatch`
 */
export function recogniseImages(file: FitsFile): Recognition | null {
  const images = file.hdus
    .filter((hdu): hdu is ImageHdu => hdu.type === 'image' && hdu.rowCount > 0 && hdu.axes[0]! > 1)
    .map((image): NamedImage => ({ image, kind: kindOfArray(image.name), arm: armOfName(image.name) }));
  const fluxes = fluxImages(images, file.label);
  if (fluxes.length === 0) return null;
  const rowCount = fluxes[0]!.image.rowCount;
  for (const { image } of fluxes) {
    if (image.rowCount === rowCount) continue;
    const detail = `the arms must have ${rowCount} rows each, got ${image.rowCount}`;
    throw new InputFault('shape-mismatch', { file: file.label, hdu: image.index }, detail);
  }
  const single = fluxes.length === 1 ? fewRowsRecognition(file, fluxes[0]!, images) : null;
  if (single !== null) return single;

  const recognised: string[] = [];
  const missing: string[] = [];
  const arms = fluxes.map((flux) => recogniseArm(file, flux, fluxes.length, images, recognised, missing));
  return {
    form: rowCount === 1 ? 'image-one-spectrum' : 'row-stack',
    arms,
    rowCount,
    recognised: [`${rowCount} spectra as rows of images, ${arms.length} arm(s)`, ...recognised],
    missing,
  };
}

/** Images called flux, else the only image without a telling name. */
function fluxImages(images: readonly NamedImage[], file: string): NamedImage[] {
  const named = images.filter(({ kind }) => kind === 'flux');
  if (named.length > 0) {
    const arms = new Set(named.map(({ arm }) => arm));
    if (arms.size === named.length) return named;
    const list = named.map(({ image }) => `HDU ${image.index} '${image.name}'`).join(', ');
    throw new InputFault('layout-ambiguous', { file }, `one image per arm must be the flux, got ${list}`);
  }
  const unnamed = images.filter(({ kind, image }) => kind === null && image.axes.length <= 3);
  if (unnamed.length <= 1) return unnamed;
  const list = unnamed.map(({ image }) => `HDU ${image.index} '${image.name}'`).join(', ');
  throw new InputFault('layout-ambiguous', { file }, `one image must be the flux, got ${list}`);
}

function fewRowsRecognition(
  file: FitsFile,
  { image, kind, arm }: NamedImage,
  images: readonly NamedImage[],
): Recognition | null {
  if (image.rowCount < 2 || image.rowCount > MOST_ROWS_OF_ONE_SPECTRUM) return null;
  const hasSiblings = images.some((other) => other.arm === arm && other.kind !== null && other.kind !== kind);
  const hasTargets = file.hdus.some((hdu) => hdu.type === 'table' && hdu.rowCount === image.rowCount);
  if (hasSiblings || hasTargets) return null;
  const found = fewRowsOf(image);
  if (found === null) return null;
  const axis = found.wavelength === null ? axisOf(file, image) : null;
  const medium = chooseMedium(file, image.index, [], axis?.medium ?? null);
  const missing = ['no line spread'];
  if (found.spread === null) missing.push('no row explains the scatter: noise will be estimated');
  return {
    form: 'image-one-spectrum',
    arms: [{ ...armOfFewRows(image, found, medium.medium), fluxPer: fluxPerOf(bunit(image)) }],
    rowCount: 1,
    recognised: [
      found.sentence,
      ...(axis === null ? [] : [`wavelength from ${axis.recognised}`]),
      ...medium.recognised,
    ],
    missing: [...missing, ...medium.missing],
  };
}

function recogniseArm(
  file: FitsFile,
  flux: NamedImage,
  armCount: number,
  images: readonly NamedImage[],
  recognised: string[],
  missing: string[],
): ArmLayout {
  const { image } = flux;
  const place: FaultPlace = { file: file.label, hdu: image.index };
  // With one arm in the file a sibling need not carry the arm's word (`FLUX_MAIN` beside `ERROR`).
  const siblings = images.filter((other) => other !== flux && (other.arm === flux.arm || armCount === 1));
  const ofKind = (...kinds: ArrayKind[]): NamedImage[] =>
    siblings.filter(
      ({ kind, image: sibling }) => kind !== null && kinds.includes(kind) && fits(image, sibling),
    );
  const spread = ofKind('inverse-variance', 'error', 'variance')[0];
  const masks = ofKind('quality');
  const goods = masks.length > 0 ? [] : ofKind('good');
  const sky = ofKind('sky')[0];
  const wave = ofKind('wavelength')[0];
  const lineSpread = ofKind('line-spread')[0];
  const called = flux.arm === '' ? `HDU ${image.index}` : `arm '${flux.arm}' (HDU ${image.index})`;

  const axis = wave === undefined ? axisOf(file, image) : null;
  const unit = wave === undefined ? null : wavelengthUnitOfImage(wave.image, file.label);
  if (wave === undefined && axis === null) {
    const detail = 'a spectral axis or a wavelength image must be there, got neither';
    throw new InputFault('wavelength-missing', place, detail);
  }
  const names = wave === undefined ? [] : [wave.image.name, bunit(wave.image)];
  const medium = chooseMedium(file, image.index, names, axis?.medium ?? null);
  const meaning = lineSpread === undefined ? null : meaningOfImage(image, lineSpread.image);
  const from = wave === undefined ? axis!.recognised : `HDU ${wave.image.index} '${wave.image.name}'`;
  recognised.push(`${called}: flux from '${image.name}', wavelength from ${from}`);
  if (spread === undefined) missing.push(`${called}: no error image, noise will be estimated`);
  else recognised.push(`${called}: ${String(spread.kind)} from '${spread.image.name}'`);
  for (const extra of [...masks, ...goods]) recognised.push(`${called}: mask from '${extra.image.name}'`);
  if (sky !== undefined) recognised.push(`${called}: sky from '${sky.image.name}'`);
  if (lineSpread !== undefined && meaning !== null) {
    recognised.push(`${called}: line spread from '${lineSpread.image.name}', read as ${meaning}`);
  } else missing.push(`${called}: no line spread that could be understood`);
  addOnce(recognised, medium.recognised);
  addOnce(missing, medium.missing);
  return {
    name: flux.arm,
    wavelength: wave === undefined ? null : imageArray(wave.image.index),
    wavelengthMeaning: unit?.meaning ?? 'linear',
    wavelengthUnitAngstrom: unit?.angstrom ?? 1,
    medium: medium.medium,
    flux: imageArray(image.index),
    fluxPer: fluxPerOf(bunit(image)),
    spread: spread === undefined ? null : imageArray(spread.image.index),
    spreadMeaning: spreadMeaning(spread?.kind),
    quality: [...masks, ...goods].map((mask) => imageArray(mask.image.index)),
    qualityBadWhen: goods.length > 0 ? 'zero' : 'nonzero',
    sky: sky === undefined ? null : imageArray(sky.image.index),
    lineSpread: lineSpread === undefined || meaning === null ? null : imageArray(lineSpread.image.index),
    lineSpreadMeaning: meaning ?? 'sigma-pixel',
  };
}

/** A sibling fits when it has the flux's pixels and its rows, one row for all, or a block of rows per spectrum. */
function fits(flux: ImageHdu, sibling: ImageHdu): boolean {
  const sameLength = sibling.axes[0] === flux.axes[0];
  return sameLength && (sibling.rowCount === 1 || sibling.rowCount % flux.rowCount === 0);
}

function meaningOfImage(flux: ImageHdu, sibling: ImageHdu): ArmLayout['lineSpreadMeaning'] | null {
  if (sibling.rowCount > flux.rowCount) return 'resolution-matrix';
  return lineSpreadMeaningOf(sibling.name, bunit(sibling), sibling.readRows(0, 1));
}

function wavelengthUnitOfImage(image: ImageHdu, file: string) {
  return wavelengthUnitOfArray(image.name, bunit(image), image.readRows(0, 1), {
    file,
    hdu: image.index,
  });
}

function axisOf(file: FitsFile, image: ImageHdu) {
  for (const header of headersFor(file, image.index)) {
    const place = { file: file.label, hdu: image.index };
    const axis = spectralAxisOf(file, header, 1, image.axes[0]!, place);
    if (axis !== null) return axis;
  }
  return null;
}

function bunit(image: ImageHdu): string {
  return cardText(image.header, 'BUNIT');
}

function spreadMeaning(kind: ArrayKind | null | undefined): SpreadMeaning {
  return kind === 'error' || kind === 'variance' || kind === 'inverse-variance' ? kind : 'none';
}

function addOnce(list: string[], sentences: readonly string[]): void {
  for (const sentence of sentences) if (!list.includes(sentence)) list.push(sentence);
}
