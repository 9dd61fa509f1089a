import { InputFault } from '../../errors.ts';
import type { FaultPlace } from '../../errors.ts';
import type { ParsedHeader } from './header.ts';
import { integerCard } from './header.ts';

/** Shape and size of the data of one HDU, as its header states them. */
export interface DataUnit {
  readonly bitpix: number;
  readonly axes: readonly number[];
  readonly parameterCount: number;
  readonly groupCount: number;
  /** Random groups: NAXIS1 = 0 and GROUPS = T in the primary header (FITS 4.0, section 6). */
  readonly randomGroups: boolean;
  /** Bytes before padding. */
  readonly byteLength: number;
}

const BITPIX_VALUES = new Set([8, 16, 32, 64, -32, -64]);
/** FITS 4.0, section 4.4.1.1. */
const MOST_AXES = 999;

/**
 * Size of the data: |BITPIX|/8 · GCOUNT · (PCOUNT + NAXIS1·NAXIS2·…), FITS 4.0, equation 2; random groups leave the
 * zero NAXIS1 out (equation 4).
 *
 * @throws InputFault fits-bad-header when a card is missing, not an integer, or out of range
 */
export function readDataUnit(header: ParsedHeader, place: FaultPlace): DataUnit {
  const bitpix = integerCard(header, 'BITPIX', place);
  if (!BITPIX_VALUES.has(bitpix)) {
    throw fault(place, `BITPIX must be one of 8, 16, 32, 64, -32, -64, got ${bitpix}`);
  }
  const axisCount = count(header, 'NAXIS', place);
  if (axisCount > MOST_AXES) throw fault(place, `NAXIS must be at most ${MOST_AXES}, got ${axisCount}`);
  const axes = Array.from({ length: axisCount }, (_, i) => count(header, `NAXIS${i + 1}`, place));
  const parameterCount = count(header, 'PCOUNT', place, 0);
  const groupCount = count(header, 'GCOUNT', place, 1);
  const randomGroups = axes.length > 1 && axes[0] === 0 && header.get('GROUPS') === true;
  const counted = randomGroups ? axes.slice(1) : axes;
  const pixels = counted.length === 0 ? 0 : counted.reduce((product, axis) => product * axis, 1);
  const byteLength = (Math.abs(bitpix) / 8) * groupCount * (parameterCount + pixels);
  if (!Number.isSafeInteger(byteLength)) {
    throw fault(place, `the data must have fewer than 2^53 bytes, got ${byteLength}`);
  }
  return { bitpix, axes, parameterCount, groupCount, randomGroups, byteLength };
}

function count(header: ParsedHeader, keyword: string, place: FaultPlace, fallback?: number): number {
  const value = integerCard(header, keyword, place, fallback);
  if (value < 0) throw fault(place, `${keyword} must be at least 0, got ${value}`);
  return value;
}

function fault(place: FaultPlace, detail: string): InputFault {
  return new InputFault('fits-bad-header', place, detail);
}
