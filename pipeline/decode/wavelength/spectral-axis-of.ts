import { InputFault } from '../../errors.ts';
import type { FaultPlace } from '../../errors.ts';
import type { FitsFile, Header, TableHdu } from '../fits/index.ts';
import { type SpectralAxis, spectralAxisFromHeader } from './spectral-axis.ts';
import { parseWavelengthUnit } from './wavelength-unit.ts';

/**
 * The wavelength of every pixel of a spectral axis, wherever the header says it stands: in its own cards, or
 * (-TAB, Greisen et al. 2006, section 6) in a table of the same file.
 *
 * @returns null when the header has no spectral axis there
 * @throws InputFault as `spectralAxisFromHeader` does; `wavelength-missing` when a -TAB axis names no table, column
 *   or values of the file
 */
export function spectralAxisOf(
  file: FitsFile,
  header: Header,
  axis: number,
  pixels: number,
  place: FaultPlace,
): SpectralAxis | null {
  const type = text(header, `CTYPE${axis}`).toUpperCase();
  const tabulated = /^(WAVE|AWAV)-TAB$/.exec(type);
  return tabulated === null
    ? spectralAxisFromHeader(header, axis, pixels, place)
    : tabulatedAxis(file, header, axis, pixels, tabulated[1] === 'AWAV' ? 'air' : 'vacuum', place);
}

/**
 * Paper III, eqs. 89–91: ψ = CRVAL + CDELT (p − CRPIX); the index vector, when there is one, turns ψ into a
 * 1-based position in the coordinate array, else ψ is that position; between entries both are linear.
 */
function tabulatedAxis(
  file: FitsFile,
  header: Header,
  axis: number,
  pixels: number,
  medium: SpectralAxis['medium'],
  place: FaultPlace,
): SpectralAxis {
  const tableName = text(header, `PS${axis}_0`);
  const table = file.hdus.find((hdu): hdu is TableHdu => hdu.type === 'table' && hdu.name === tableName);
  if (table === undefined) {
    throw new InputFault(
      'wavelength-missing',
      place,
      `PS${axis}_0 must name a table of the file, got '${tableName}'`,
    );
  }
  const cell = (keyword: string): Float64Array => {
    const wanted = text(header, keyword);
    const column = table.columns.findIndex(({ name }) => name.toUpperCase() === wanted.toUpperCase());
    if (column >= 0 && table.rowCount > 0) return table.readCell(column, 0);
    const found = `'${wanted}' in a table of ${table.rowCount} rows`;
    throw new InputFault(
      'wavelength-missing',
      place,
      `${keyword} must name a column of '${tableName}', got ${found}`,
    );
  };
  const values = cell(`PS${axis}_1`);
  const index = text(header, `PS${axis}_2`) === '' ? null : cell(`PS${axis}_2`);
  // The unit of the coordinate array is CUNIT's; the standard's default is the metre.
  const unitText = text(header, `CUNIT${axis}`);
  const unit = unitText === '' ? 1e10 : parseWavelengthUnit(unitText)?.angstrom;
  if (unit === undefined) {
    throw new InputFault('unit-unknown', place, `CUNIT${axis} must be a length, got '${unitText}'`);
  }
  const step = number(header, `CD${axis}_${axis}`, number(header, `CDELT${axis}`, 1));
  const wavelengthAngstrom = Float64Array.from({ length: pixels }, (_, i) => {
    const psi = number(header, `CRVAL${axis}`, 0) + step * (i + 1 - number(header, `CRPIX${axis}`, 0));
    const position = index === null ? psi : positionIn(index, psi);
    return unit * valueAt(values, position);
  });
  if (!wavelengthAngstrom.every(Number.isFinite)) {
    const found = `${values.length} entries for ${pixels} pixels`;
    throw new InputFault(
      'wavelength-missing',
      place,
      `table '${tableName}' must cover every pixel, got ${found}`,
    );
  }
  return { wavelengthAngstrom, medium, recognised: `a ${medium} axis tabulated in '${tableName}'` };
}

/** 1-based position, linear between entries and half an entry beyond the ends; NaN further out (paper III, 6.1.2). */
function valueAt(values: Float64Array, position: number): number {
  if (values.length === 1) return Math.abs(position - 1) <= 0.5 ? values[0]! : NaN;
  if (position < 0.5 || position > values.length + 0.5) return NaN;
  const lower = Math.min(Math.max(Math.floor(position), 1), values.length - 1);
  return values[lower - 1]! + (position - lower) * (values[lower]! - values[lower - 1]!);
}

/** 1-based position of ψ in a monotonic index vector; NaN outside it. */
function positionIn(index: Float64Array, psi: number): number {
  for (let k = 1; k < index.length; k++) {
    const from = index[k - 1]!;
    const to = index[k]!;
    if ((psi - from) * (psi - to) <= 0 && from !== to) return k + (psi - from) / (to - from);
  }
  return NaN;
}

function text(header: Header, keyword: string): string {
  const value = header.get(keyword);
  return typeof value === 'string' ? value.trim() : '';
}

function number(header: Header, keyword: string, fallback: number): number {
  const value = header.get(keyword);
  return typeof value === 'number' && Number.isFinite(value) ? value : fallback;
}
