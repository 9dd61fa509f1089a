import type { Spectrum } from '../../pipeline/decode/index.ts';
import type { ExposureContext } from '../../pipeline/grid/index.ts';
import { type Measure, measureChunk } from '../../worker/measure-chunk.ts';
import { type ChunkResult, countStep, type ThreadTask } from '../../worker/measure-contract.ts';
import { contextOfExposure } from '../../worker/sky-of-exposure.ts';
import { fabricatedAnswer, fabricatedCurves } from '../store/fabricated-outcome.ts';
import { ENDS_ITS_THREAD, NEVER_ENDS, THROWS } from './practice-folder.ts';

/** Long enough that a kill hits a chunk in hand, short enough for a test. */
const MS_PER_SPECTRUM = 15;

/**
 * In place of the real measurement, which takes seconds: everything around it is the program's own. The
 * answer depends on the spectrum and on the exposure's noise, so a lost or doubled context would show.
 */
const measure: Measure = (spectrum, context, _options, onStage) => {
  const level = meanFlux(spectrum);
  if (level === THROWS) throw new TypeError('a planted bug');
  if (level === ENDS_ITS_THREAD) process.exit(7);
  const until = performance.now() + (level === NEVER_ENDS ? Number.POSITIVE_INFINITY : MS_PER_SPECTRUM);
  while (performance.now() < until);
  onStage('stand-in');
  const redshift = level / 1_000;
  const answer = fabricatedAnswer({
    redshift,
    noiseFactor: context.noiseFactor ?? 0,
    needsReview: level > 150,
  });
  return { answer, curves: fabricatedCurves() };
};

function meanFlux(spectrum: Spectrum): number {
  const { flux } = spectrum.arms[0]!;
  return flux.reduce((sum, value) => sum + value, 0) / flux.length;
}

export default function runTask(task: ThreadTask): ChunkResult | ExposureContext {
  const step = () => {
    countStep(task.beat);
  };
  step();
  if (task.kind === 'exposure') return contextOfExposure(task, step);
  // Stands for the families, loaded.
  step();
  return measureChunk(task, measure, () => performance.now(), step);
}
