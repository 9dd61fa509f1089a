import type { ReasonWord } from '../../pipeline/weigh/answer.ts';

/** What each reason word means, in words a person who never saw this program understands. */
export const REASON_MEANINGS: Readonly<Record<ReasonWord, string>> = {
  unreadable: 'the file, HDU or row could not be read',
  'no-light': 'nothing above the noise',
  faint: 'too little signal for the answer to be trusted',
  rival: 'a different redshift explains the data nearly as well',
  'lone-line': 'the answer rests on a single emission line',
  'methods-disagree': 'cross-correlation and fit prefer different redshifts',
  'poor-fit': 'the best model leaves more than noise and known template mismatch explain',
  gaps: 'the lines that would decide fall where there are no data',
  'range-edge': 'the search ended before the fit did',
  'sky-line': 'the deciding feature sits on a night-sky line or an atmospheric band',
  'impossible-lines': 'a line ratio is outside what atoms allow, or a line that must be there is absent',
  'wrong-noise': 'the stated errors do not match the scatter',
  'frame-unknown': 'nothing says which frame the wavelengths are in',
  'too-sharp': 'the spectrograph resolves finer than the templates',
  'repeat-clash': 'another spectrum of the same target says something else',
  'fibre-pattern': 'other spectra of this fibre or exposure show the same feature at the same wavelength',
  unusual: 'bright, well measured, and nothing in the families explains it',
  'over-limits': 'took more time or memory than allowed and was set aside',
};

/** The reason words of a row, in the order given; words this version does not know are kept. */
export function reasonWords(reasons: string): readonly string[] {
  return reasons.split(' ').filter((word) => word !== '');
}

/** Plain meaning of a reason word; the word itself when this version does not know it. */
export function reasonMeaning(word: string): string {
  return Object.hasOwn(REASON_MEANINGS, word) ? REASON_MEANINGS[word as ReasonWord] : word;
}
