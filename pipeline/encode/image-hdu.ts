import type { HduParts } from './hdu-parts.ts';
import { zeroPadded } from './hdu-parts.ts';
import type { CardSpec, ImageSpec, Pixels } from './hdu-spec.ts';

/**
 * Cards and data of an image (FITS 4.0, sections 4.4.1 and 7.1).
 *
 * @param isPrimary a primary HDU has no PCOUNT and GCOUNT cards
 * @throws RangeError when the pixels are not as many as the axes ask for
 */
export function imageParts(image: ImageSpec, isPrimary: boolean): HduParts {
  const { axes } = image;
  const pixels = image.pixels ?? new Uint8Array(0);
  const wanted = axes.length === 0 ? 0 : axes.reduce((product, axis) => product * axis, 1);
  if (pixels.length !== wanted) {
    throw new RangeError(`image must have ${wanted} pixels for its axes, got ${pixels.length}`);
  }
  const structure: CardSpec[] = [
    { keyword: 'BITPIX', value: bitpixOf(pixels), comment: 'array data type' },
    { keyword: 'NAXIS', value: axes.length, comment: 'number of array dimensions' },
    ...axes.map((axis, i) => ({ keyword: `NAXIS${i + 1}`, value: axis })),
  ];
  if (isPrimary) {
    structure.push({ keyword: 'EXTEND', value: true, comment: 'extensions may follow' });
  } else {
    structure.push({ keyword: 'PCOUNT', value: 0, comment: 'bytes after the array' });
    structure.push({ keyword: 'GCOUNT', value: 1, comment: 'groups' });
  }
  if (image.unit !== undefined) structure.push({ keyword: 'BUNIT', value: image.unit });
  return { extension: 'IMAGE', structure, data: pixelBytes(pixels) };
}

function bitpixOf(pixels: Pixels): number {
  const bits = 8 * pixels.BYTES_PER_ELEMENT;
  return pixels instanceof Float32Array || pixels instanceof Float64Array ? -bits : bits;
}

/** Pixels with the most significant byte first, padded to whole blocks. */
function pixelBytes(pixels: Pixels): Uint8Array<ArrayBuffer> {
  const bytes = zeroPadded(pixels.byteLength);
  const view = new DataView(bytes.buffer);
  if (pixels instanceof Uint8Array) bytes.set(pixels);
  else if (pixels instanceof Int16Array) {
    for (let i = 0; i < pixels.length; i++) view.setInt16(2 * i, pixels[i]!);
  } else if (pixels instanceof Int32Array) {
    for (let i = 0; i < pixels.length; i++) view.setInt32(4 * i, pixels[i]!);
  } else if (pixels instanceof Float32Array) {
    for (let i = 0; i < pixels.length; i++) view.setFloat32(4 * i, pixels[i]!);
  } else {
    for (let i = 0; i < pixels.length; i++) view.setFloat64(8 * i, pixels[i]!);
  }
  return bytes;
}
