/** What one column or image holds, as far as its name, unit and UCD tell. */
export type ArrayKind =
  | 'flux'
  | 'wavelength'
  | 'error'
  | 'variance'
  | 'inverse-variance'
  | 'quality'
  | 'good'
  | 'sky'
  | 'line-spread';

/** Name stems, tried in this order: `flux_error` is an error, `sky_error` is neither sky nor error. */
const KIND_STEMS: readonly (readonly [ArrayKind | 'other', RegExp])[] = [
  // What others concluded from the data is never read.
  ['other', /model|templ|synth|best_?fit|norm|continuum|redshift|class/],
  ['other', /sky.*(err|var|sigma)|telluric/],
  ['other', /raw|flat|throughput|calib|response/],
  ['line-spread', /spread|lsf|resol|fwhm|psf|disp(ersion)?$/],
  ['quality', /mask|quality|flag|(^|_)(dq|qual|bad|bad_?pix(els?)?)($|_)/],
  ['good', /(^|_)good($|_|pix)/],
  ['inverse-variance', /ivar|inv(erse)?_?var|(^|_)(weights?|wht|wgt)($|_)/],
  ['variance', /variance|(^|_)var($|_)/],
  ['error', /err|sigma|st_?dev|(^|_)std(_?dev)?($|_)|unc(ert\w*)?($|_)|noise|(^|_)rms($|_)/],
  ['sky', /sky/],
  [
    'flux',
    /flux|(^|_)f_?(lam(bda)?|nu)($|_)|(^|_)(spec|spectrum|spectra|sci|science|counts?|intensity|signal)($|_)/,
  ],
  ['wavelength', /(^|_)(log_?(10)?_?|ln_?|air_?|vac(uum)?_?|[av])?(wave\w*|wav|wl|lam(bda)?)($|_)/],
];

const KIND_UCDS: readonly (readonly [ArrayKind, RegExp])[] = [
  ['error', /^stat\.error/],
  ['variance', /^stat\.variance/],
  ['quality', /^meta\.code(\.qual)?/],
  ['flux', /^(phot\.(flux|fluence|count)|arith\.rate)/],
  ['wavelength', /^em\.wl/],
  ['line-spread', /^(spect\.resolution|instr\.dispersion|instr\.det\.psf)/],
];

/**
 * Judge what an array holds by generic stems of its name, else by its UCD1+ word.
 *
 * @param name column name or EXTNAME in any case
 * @param ucd UCD1+ text, may be empty
 * @returns null when neither tells, or when it is something this program must not read
 */
export function kindOfArray(name: string, ucd = ''): ArrayKind | null {
  const word = ucd.trim().toLowerCase();
  for (const [kind, pattern] of KIND_UCDS) if (pattern.test(word)) return kind;
  const plain = plainName(name);
  for (const [kind, pattern] of KIND_STEMS) if (pattern.test(plain)) return kind === 'other' ? null : kind;
  return null;
}

/** Lower case, words parted by single underscores: `Flux-Error`, `fluxError` and `FLUX ERROR` are one name. */
export function plainName(name: string): string {
  return name
    .trim()
    .replace(/([a-z0-9])([A-Z][a-z])/g, '$1_$2')
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '_')
    .replace(/^_|_$/g, '');
}

/** Words that name a kind of array; what is left of a name without them names the arm. */
const KIND_WORDS =
  /^(flux|spec|spectrum|spectra|sci|science|counts?|error|err|sigma|std|stdev|uncertainty|unc|noise|ivar|invvar|inverse|variance|var|mask|quality|qual|flag|flags|dq|sky|wavelength|wavelengths|wave|wav|lambda|lam|line|spread|lsf|resolution|disp|dispersion|fwhm|weight|weights)$/;

/**
 * The arm a name speaks of: what remains of `FLUX_ERROR_BLUE` or `b_flux` when the words for kinds are gone.
 *
 * @returns lower case; empty when nothing remains
 */
export function armOfName(name: string): string {
  return plainName(name)
    .split('_')
    .filter((word) => !KIND_WORDS.test(word))
    .join('_');
}
