import { InputFault } from '../../errors.ts';
import type { FaultPlace } from '../../errors.ts';
import type { Header } from '../fits/model.ts';
import { SPEED_OF_LIGHT_KM_S } from '../light.ts';
import { LONGEST_ANGSTROM, SHORTEST_ANGSTROM, wavelengthUnitByNumbers } from './wavelength-numbers.ts';
import { parseWavelengthUnit } from './wavelength-unit.ts';

/** A wavelength axis that a header describes. */
export interface SpectralAxis {
  /** Pixel centres in the medium the header names, ångström, in pixel order. */
  readonly wavelengthAngstrom: Float64Array;
  /** Null when the header does not say. */
  readonly medium: 'vacuum' | 'air' | null;
  /** What it was read from, in plain words. */
  readonly recognised: string;
}

/** The numbers of FITS WCS that one linear axis needs. */
interface LinearTerms {
  readonly referencePixel: number;
  readonly referenceValue: number;
  readonly step: number;
}

/** Hz and eV·Å conversions need c in Å/s. */
const C_ANGSTROM_PER_S = SPEED_OF_LIGHT_KM_S * 1e13;

const AXIS_TYPE = /^(WAVE|AWAV|FREQ|LINEAR|LAMBDA|WAVELENGTH|VWAV)?(-(LOG|W2W|F2W|W2F|TAB|A2W|GRI|GRA))?$/;

/**
 * The wavelength of every pixel of a spectral axis (Greisen et al. 2006, FITS paper III): WAVE, AWAV and FREQ,
 * linear, logarithmic (eq. 5) or sampled linearly in frequency (F2W, eq. 11); beside these the older habit of
 * a log10 axis, told by DC-FLAG or COEFF0/COEFF1 or by a reference value that can only be a log10.
 *
 * @param header of the HDU that holds the flux
 * @param axis FITS axis number of the wavelength, 1-based
 * @param pixels NAXISn
 * @param place for messages
 * @returns null when the header has no spectral axis there
 * @throws InputFault `unit-unknown` when CUNIT is no length or frequency; `fits-unsupported` for -TAB and grisms
 */
export function spectralAxisFromHeader(
  header: Header,
  axis: number,
  pixels: number,
  place: FaultPlace,
): SpectralAxis | null {
  const terms = linearTerms(header, axis);
  if (terms === null) return null;
  const type = text(header, `CTYPE${axis}`).toUpperCase();
  const parts = AXIS_TYPE.exec(type);
  const quantity = parts?.[1] ?? '';
  const algorithm = parts?.[3] ?? '';
  if (type !== '' && parts === null && quantity === '') return null;
  if (algorithm === 'TAB' || algorithm === 'GRI' || algorithm === 'GRA') {
    throw new InputFault(
      'fits-unsupported',
      place,
      `CTYPE${axis} must be linear, -LOG or -F2W, got '${type}'`,
    );
  }
  const log10 = log10Axis(header, terms, pixels);
  const medium = quantity === 'AWAV' ? 'air' : quantity === 'WAVE' || quantity === 'FREQ' ? 'vacuum' : null;
  if (log10 !== null) return { wavelengthAngstrom: log10, medium, recognised: log10Sentence(terms, type) };

  const unitText = text(header, `CUNIT${axis}`);
  if (quantity === 'FREQ') {
    const hertz = hertzPerUnit(unitText, place, axis);
    const values = sample(terms, pixels, algorithm === 'LOG' ? 'LOG' : '');
    for (let i = 0; i < pixels; i += 1) values[i] = C_ANGSTROM_PER_S / (values[i]! * hertz);
    return { wavelengthAngstrom: values, medium, recognised: `a ${type} axis in ${unitText || 'Hz'}` };
  }
  const unit = lengthUnit(header, unitText, terms, pixels, quantity, place, axis);
  const values = sample(terms, pixels, algorithm);
  for (let i = 0; i < pixels; i += 1) values[i] = values[i]! * unit;
  return { wavelengthAngstrom: values, medium, recognised: `a ${type || 'linear'} axis in the header` };
}

/** CRVAL, CRPIX and the step of one axis; null when the header has none. */
function linearTerms(header: Header, axis: number): LinearTerms | null {
  const referenceValue = number(header, `CRVAL${axis}`) ?? number(header, 'COEFF0');
  const cdelt = number(header, `CDELT${axis}`);
  const pc = number(header, `PC${axis}_${axis}`) ?? 1;
  const step =
    number(header, `CD${axis}_${axis}`) ?? (cdelt === null ? number(header, 'COEFF1') : cdelt * pc);
  if (referenceValue === null || step === null || step === 0) return null;
  return { referencePixel: number(header, `CRPIX${axis}`) ?? 1, referenceValue, step };
}

/**
 * The axis as log10 of ångström, or null when it is not one. Both the standard's WAVE-LOG (which keeps the
 * reference value in ångström or metres) and this older form turn up under one name: the numbers decide.
 */
function log10Axis(header: Header, terms: LinearTerms, pixels: number): Float64Array | null {
  const values = sample(terms, pixels, '');
  const low = Math.min(values[0]!, values[pixels - 1]!);
  const high = Math.max(values[0]!, values[pixels - 1]!);
  const plausible = low >= Math.log10(SHORTEST_ANGSTROM) && high <= Math.log10(LONGEST_ANGSTROM);
  // A linear axis in µm can start at 3 as well, but never with steps of 1e-4 or a log flag.
  const flagged = header.get('DC-FLAG') === 1 || number(header, 'COEFF0') !== null;
  const saysMicron = parseWavelengthUnit(text(header, 'CUNIT1'))?.angstrom === 1e4;
  if (!plausible || (saysMicron && !flagged)) return null;
  return values.map((value) => 10 ** value);
}

function log10Sentence(terms: LinearTerms, type: string): string {
  const named = type === '' ? 'no axis type' : `axis type '${type}'`;
  return `a log10 axis (reference value ${terms.referenceValue} can only be log10 of ångström; ${named})`;
}

/** World coordinate of each pixel in the unit of CRVAL. */
function sample(terms: LinearTerms, pixels: number, algorithm: string): Float64Array {
  const { referencePixel, referenceValue, step } = terms;
  const values = new Float64Array(pixels);
  for (let i = 0; i < pixels; i += 1) {
    const offset = (i + 1 - referencePixel) * step;
    if (algorithm === 'LOG') values[i] = referenceValue * Math.exp(offset / referenceValue);
    // Linear in frequency: 1/λ is linear, with dλ/dν taken at the reference point (paper III, eq. 11).
    else if (algorithm === 'F2W') values[i] = referenceValue / (1 - offset / referenceValue);
    else values[i] = referenceValue + offset;
  }
  return values;
}

function lengthUnit(
  header: Header,
  unitText: string,
  terms: LinearTerms,
  pixels: number,
  quantity: string,
  place: FaultPlace,
  axis: number,
): number {
  const stated = parseWavelengthUnit(unitText);
  if (stated !== null) return stated.angstrom;
  if (unitText !== '') {
    throw new InputFault('unit-unknown', place, `CUNIT${axis} must be a length, got '${unitText}'`);
  }
  // The standard's default is the metre; many files leave the unit out and mean ångström: the numbers decide.
  const end = terms.referenceValue + (pixels - terms.referencePixel) * terms.step;
  const start = terms.referenceValue + (1 - terms.referencePixel) * terms.step;
  const byNumbers = wavelengthUnitByNumbers(Math.min(start, end), Math.max(start, end));
  if (byNumbers !== null) return byNumbers.angstrom;
  if (quantity === 'WAVE' || quantity === 'AWAV') return 1e10;
  const found = `${Math.min(start, end)} to ${Math.max(start, end)} (${header.keys().length} cards)`;
  throw new InputFault('unit-unknown', place, `the axis must run over wavelengths, got ${found}`);
}

function hertzPerUnit(unitText: string, place: FaultPlace, axis: number): number {
  const factors: Record<string, number> = { '': 1, hz: 1, khz: 1e3, mhz: 1e6, ghz: 1e9, thz: 1e12 };
  const factor = factors[unitText.toLowerCase()];
  if (factor === undefined) {
    throw new InputFault('unit-unknown', place, `CUNIT${axis} must be a frequency, got '${unitText}'`);
  }
  return factor;
}

function number(header: Header, keyword: string): number | null {
  const value = header.get(keyword);
  return typeof value === 'number' && Number.isFinite(value) ? value : null;
}

function text(header: Header, keyword: string): string {
  const value = header.get(keyword);
  return typeof value === 'string' ? value.trim() : '';
}
