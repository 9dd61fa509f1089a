import { InputFault } from '../../errors.ts';
import type { ByteSource } from '../byte-source.ts';
import { openAsciiTable } from './ascii-table.ts';
import { openBinaryTable } from './binary-table.ts';
import { CARD_BYTES, paddedLength } from './blocks.ts';
import { beginsHdu } from './card.ts';
import type { DataRange } from './data-range.ts';
import type { DataUnit } from './data-unit.ts';
import { readDataUnit } from './data-unit.ts';
import type { ParsedHeader } from './header.ts';
import { buildHeader, textCard } from './header.ts';
import { readHeaderCards } from './header-cards.ts';
import { openImage } from './image-hdu.ts';
import type { ReadLimits } from './limits.ts';
import type { FitsFile, Hdu } from './model.ts';

/**
 * Walks the headers of a FITS file (FITS 4.0) and opens every HDU; data are read only when asked for, by byte range.
 *
 * An HDU whose size is known but whose content is not understood becomes type `other` with a reason that begins with
 * the fault code. When the walk cannot go on, the HDUs before are kept and `fault` says why; a truncated last HDU is
 * kept too, its whole rows stay readable.
 *
 * @throws InputFault file-empty, file-kind-unknown; fits-no-end, fits-truncated, fits-bad-header or fits-unsupported
 *   when not even the primary HDU can be opened
 */
export function readFits(source: ByteSource, limits: ReadLimits): FitsFile {
  if (source.size === 0) {
    throw new InputFault('file-empty', { file: source.label }, 'the file must hold bytes, got 0');
  }
  const hdus: Hdu[] = [];
  let offset = 0;
  let fault: InputFault | null = null;
  while (offset < source.size && fault === null) {
    const index = hdus.length;
    if (!isNextHdu(source, offset, index)) break;
    if (index >= limits.hdusPerFile) {
      const detail = `the file must have at most ${limits.hdusPerFile} HDUs (hdusPerFile), got more`;
      fault = new InputFault('file-too-large', { file: source.label, hdu: index }, detail);
      break;
    }
    try {
      const { hdu, range } = openHdu(source, offset, index, limits);
      hdus.push(hdu);
      fault = truncation(range);
      offset = range.offset + paddedLength(range.byteLength);
    } catch (error) {
      if (!(error instanceof InputFault) || index === 0) throw error;
      fault = error;
    }
  }
  const trailingBytes = fault === null ? Math.max(0, source.size - offset) : 0;
  return { label: source.label, hdus, fault, trailingBytes };
}

/**
 * Whether a header begins at `offset`. What follows the last HDU and begins with no XTENSION card is passed over, as
 * the standard asks of special records (FITS 4.0, section 3.5).
 */
function isNextHdu(source: ByteSource, offset: number, index: number): boolean {
  const start = String.fromCharCode(...source.read(offset, CARD_BYTES));
  if (index > 0) return start.startsWith('XTENSION=');
  if (beginsHdu(start) && start.startsWith('SIMPLE')) return true;
  const place = { file: source.label };
  throw new InputFault(
    'file-kind-unknown',
    place,
    'a FITS file must begin with a SIMPLE card, got other bytes',
  );
}

function openHdu(
  source: ByteSource,
  offset: number,
  index: number,
  limits: ReadLimits,
): { readonly hdu: Hdu; readonly range: DataRange } {
  const place = { file: source.label, hdu: index };
  const { cards, dataOffset } = readHeaderCards(source, offset, index, limits);
  const header = buildHeader(cards);
  if (index === 0 && header.get('SIMPLE') !== true) {
    throw new InputFault('fits-unsupported', place, 'SIMPLE must be T, got another value');
  }
  const unit = readDataUnit(header, place);
  const range: DataRange = { source, hdu: index, offset: dataOffset, byteLength: unit.byteLength };
  return { hdu: classify(header, unit, range), range };
}

function classify(header: ParsedHeader, unit: DataUnit, range: DataRange): Hdu {
  const place = { file: range.source.label, hdu: range.hdu };
  const name = String(header.get('EXTNAME') ?? '').trim();
  const other = (reason: string): Hdu => ({ type: 'other', index: range.hdu, name, header, reason });
  try {
    const extension = range.hdu === 0 ? 'IMAGE' : textCard(header, 'XTENSION', place).toUpperCase();
    if (extension === 'BINTABLE') {
      if (header.get('ZIMAGE') === true) return other('fits-compressed-image: tile-compressed image');
      return openBinaryTable(header, unit, range, name);
    }
    if (extension === 'TABLE') return openAsciiTable(header, unit, range, name);
    if (extension !== 'IMAGE') return other(`fits-unsupported: extension of type '${extension}'`);
    if (unit.randomGroups) return other('fits-unsupported: random groups');
    if (unit.parameterCount !== 0 || unit.groupCount !== 1) {
      return other('fits-unsupported: image with PCOUNT other than 0 or GCOUNT other than 1');
    }
    return openImage(header, unit, range, name);
  } catch (error) {
    if (error instanceof InputFault) return other(`${error.code}: ${error.message}`);
    throw error;
  }
}

/** The fault of an HDU whose data the file does not hold whole; missing padding after the data is forgiven. */
function truncation(range: DataRange): InputFault | null {
  const have = range.source.size - range.offset;
  if (have >= range.byteLength) return null;
  const detail = `the data must have ${range.byteLength} bytes, got ${Math.max(0, have)}`;
  return new InputFault('fits-truncated', { file: range.source.label, hdu: range.hdu }, detail);
}
