import type { LineMeasurement } from '../answer.ts';
import type { Case } from '../case.ts';

/** Significance above which a line counts as seen, in sigma (common practice, no source). */
export const LINE_SEEN_SIGMA = 3;

const ABSORPTION = new Set([
  'Fe II 2600',
  'Mg II 2796',
  'Mg II 2803',
  'Ca II K',
  'Ca II H',
  'G band',
  'Mg b',
  'Na D',
  'Ca II 8500',
  'Ca II 8544',
  'Ca II 8665',
]);

/** Emission lines above 3 sigma at the fitted redshift, strongest first. */
export function emissionLines(one: Pick<Case, 'lines'>): LineMeasurement[] {
  return one.lines
    .filter((l) => !ABSORPTION.has(l.name) && l.signalToNoise > LINE_SEEN_SIGMA)
    .sort((a, b) => b.signalToNoise - a.signalToNoise);
}

/** A measured line by name; undefined where it does not fall on usable pixels. */
export function lineNamed(one: Pick<Case, 'lines'>, name: string): LineMeasurement | undefined {
  return one.lines.find((l) => l.name === name);
}
