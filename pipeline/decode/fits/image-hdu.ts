import type { FaultPlace } from '../../errors.ts';
import type { DataRange } from './data-range.ts';
import { checkRows, readBytes } from './data-range.ts';
import type { DataUnit } from './data-unit.ts';
import type { Element, Scaling } from './elements.ts';
import { decodeNumbers, ELEMENT_BYTES } from './elements.ts';
import type { ParsedHeader } from './header.ts';
import { integerOrNull, numberCard } from './header.ts';
import type { ImageHdu } from './model.ts';

const ELEMENT_OF_BITPIX: Readonly<Record<number, Element>> = {
  8: 'u8',
  16: 'i16',
  32: 'i32',
  64: 'i64',
  [-32]: 'f32',
  [-64]: 'f64',
};

/**
 * An image whose rows are read on demand.
 *
 * @param name EXTNAME
 * @throws InputFault fits-bad-header when BSCALE, BZERO or BLANK is not a number
 */
export function openImage(header: ParsedHeader, unit: DataUnit, range: DataRange, name: string): ImageHdu {
  const place: FaultPlace = { file: range.source.label, hdu: range.hdu };
  const element = ELEMENT_OF_BITPIX[unit.bitpix]!;
  const scaling: Scaling = {
    scale: Number(numberCard(header, 'BSCALE', place, 1)),
    zero: numberCard(header, 'BZERO', place, 0),
    // BLANK has no meaning for floating point images (FITS 4.0, section 4.4.2.5).
    blank: unit.bitpix > 0 ? integerOrNull(header, 'BLANK', place) : null,
  };
  const width = unit.axes[0] ?? 0;
  const rowCount = unit.axes.length === 0 ? 0 : unit.axes.slice(1).reduce((n, axis) => n * axis, 1);
  const rowBytes = width * ELEMENT_BYTES[element];
  return {
    type: 'image',
    index: range.hdu,
    name,
    header,
    bitpix: unit.bitpix,
    axes: unit.axes,
    rowCount,
    readRows: (first, count) => {
      checkRows(range, rowBytes, rowCount, first, count);
      const bytes = readBytes(range, first * rowBytes, count * rowBytes, first);
      return decodeNumbers(bytes, element, count * width, scaling);
    },
  };
}
