/**
 * Every way an input can be unusable, with what to do about it. One registry: codes are never reused.
 * The worker alone maps a code to what happens next (retry, set aside, record).
 */
export const INPUT_FAULTS = {
  'file-missing': 'check the path; a file that moved after it was queued must be queued again',
  'file-empty': 'write the file again; it holds no bytes',
  'file-changed': 'the file changed after it was queued: queue it again',
  'file-too-large': 'raise the limit named in the message, or split the file',
  'file-kind-unknown': 'give FITS, or text in columns; name a profile with --profile for anything else',
  'gzip-broken': 'write the file again; the compressed stream does not decode',
  'fits-no-end': 'the header has no END card: write the file again',
  'fits-truncated': 'the file is shorter than its headers say: copy it again',
  'fits-bad-header': 'repair the header card named in the message',
  'fits-compressed-image': 'uncompress the tile-compressed image before queueing',
  'fits-unsupported': 'rewrite the HDU named in the message in a form of the FITS 4.0 standard',
  'layout-unknown': 'no spectrum was recognised: name a profile with --profile, see `shiftwork inspect`',
  'layout-ambiguous': 'more than one reading fits: name a profile with --profile, see `shiftwork inspect`',
  'wavelength-missing': 'give a spectral WCS, a wavelength array, or a profile that names one',
  'wavelength-not-monotonic': 'sort the wavelength axis',
  'unit-unknown': 'state the unit in the file or in a profile',
  'shape-mismatch': 'flux, error and wavelength must have the same number of pixels',
  'row-missing': 'the row named in the message is not in the file',
  'value-not-usable': 'repair the value named in the message',
  'too-few-pixels': 'a redshift needs more pixels than this spectrum has',
  'too-many-pixels': 'raise the limit named in the message, or rebin',
  'no-usable-pixels': 'every pixel is masked, not finite or without weight',
  'text-malformed': 'every line must have the same number of columns',
  'profile-invalid': 'correct the profile at the key named in the message',
  'document-type-refused': 'remove the document type declaration',
} as const;

export type InputFaultCode = keyof typeof INPUT_FAULTS;

/** Where in an input a fault sits. `file` is the label the caller gave the byte source. */
export interface FaultPlace {
  readonly file: string;
  readonly hdu?: number;
  readonly row?: number;
}

/** An input that cannot be measured, and why. Message: place, what must hold, what was found, the remedy. */
export class InputFault extends Error {
  readonly code: InputFaultCode;
  readonly place: FaultPlace;

  /**
   * @param detail `<what> must be <expected>, got <value>`
   */
  constructor(code: InputFaultCode, place: FaultPlace, detail: string) {
    const where = [
      place.file,
      place.hdu === undefined ? '' : ` HDU ${place.hdu}`,
      place.row === undefined ? '' : ` row ${place.row}`,
    ].join('');
    super(`${where}: ${detail}. ${INPUT_FAULTS[code]} [${code}]`);
    this.name = 'InputFault';
    this.code = code;
    this.place = place;
  }
}
