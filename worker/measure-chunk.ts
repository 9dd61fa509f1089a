import type { MeasuringOptions } from '../config/measuring.ts';
import { openInput, type OpenedInput, readSpectra, type Spectrum } from '../pipeline/decode/index.ts';
import { DEFAULT_READ_LIMITS } from '../pipeline/decode/index.ts';
import { InputFault } from '../pipeline/errors.ts';
import type { ExposureContext } from '../pipeline/grid/index.ts';
import type { Answer, Curves } from '../pipeline/index.ts';
import { type Fault, type Outcome, packCurves, type SpectrumFacts } from '../store/index.ts';
import { checkUnchanged, type OpenFile, openFile } from './input-file.ts';
import type { ChunkResult, ChunkTask, TaskInput } from './measure-contract.ts';
import { inSample } from './sample.ts';

/** Measures one spectrum; the pipeline's entry with its families already in hand. */
export type Measure = (
  spectrum: Spectrum,
  context: ExposureContext,
  options: MeasuringOptions,
  onStage: (stage: string) => void,
) => { answer: Answer; curves: Curves };

/** Rows read at a time: bounds memory, while a file is still read forward. */
const ROWS_AT_ONCE = 8;

/**
 * Reads and measures the spectra of a chunk. Every spectrum asked for gets an outcome: what goes wrong with
 * one never reaches another.
 *
 * @param now milliseconds from any fixed start, for the stage times
 * @param onSpectrum called after each spectrum
 */
export function measureChunk(
  task: ChunkTask,
  measure: Measure,
  now: () => number,
  onSpectrum: () => void,
): ChunkResult {
  const outcomes: Outcome[] = [];
  const stageMs: Record<string, number> = {};
  const troubles: ChunkResult['troubles'][number][] = [];
  let last = now();
  const onStage = (stage: string) => {
    const time = now();
    stageMs[stage] = (stageMs[stage] ?? 0) + time - last;
    last = time;
  };
  const measureOne = (input: TaskInput, spectrumId: string, read: Spectrum | InputFault): Outcome => {
    const identity = { spectrumId, inputSha256: input.sha256 };
    if (read instanceof InputFault) return { ...identity, facts: null, result: { fault: unreadable(read) } };
    const facts = factsOf(read);
    try {
      const { answer, curves } = measure(read, task.context, task.measuring, onStage);
      const keep = task.keepAllCurves || answer.needsReview || inSample(spectrumId);
      const result = { answer, curves: keep ? packCurves(curves) : null };
      onStage('keep');
      return { ...identity, facts, result };
    } catch (error) {
      if (error instanceof InputFault) return { ...identity, facts, result: { fault: unreadable(error) } };
      const { message, stack } = error as Error;
      troubles.push({ spectrumId, stack: stack ?? message });
      const detail = `the measurement failed inside the program: ${message}; the log has more`;
      return { ...identity, facts, result: { fault: { word: 'unreadable', code: 'failed-inside', detail } } };
    }
  };
  for (const input of task.inputs) {
    const outcomesOfFile: Outcome[] = [];
    try {
      withInput(input, (opened) => {
        for (const { first, count } of runsOf(input.spectra)) {
          const spectra = readSpectra(opened, input.layout, input.spectra[first]!.ordinal, count);
          onStage('decode');
          spectra.forEach((read, i) => {
            outcomesOfFile.push(measureOne(input, input.spectra[first + i]!.spectrumId, read));
            onSpectrum();
          });
        }
      });
      outcomes.push(...outcomesOfFile);
    } catch (error) {
      if (!(error instanceof InputFault)) throw error;
      // The file went away or changed under our hands: nothing read from it can be trusted.
      for (const { spectrumId } of input.spectra) {
        const result = { fault: unreadable(error) };
        outcomes.push({ spectrumId, inputSha256: input.sha256, facts: null, result });
      }
    }
  }
  return { outcomes, stageMs, troubles };
}

/** Runs of neighbouring ordinals, at most ROWS_AT_ONCE long, as positions in `spectra`. */
function* runsOf(spectra: TaskInput['spectra']): Generator<{ first: number; count: number }> {
  for (let first = 0; first < spectra.length; ) {
    let count = 1;
    while (
      count < ROWS_AT_ONCE &&
      first + count < spectra.length &&
      spectra[first + count]!.ordinal === spectra[first]!.ordinal + count
    ) {
      count++;
    }
    yield { first, count };
    first += count;
  }
}

/** The file opened last, kept so that the chunks of one compressed file undo it once per thread. */
let kept: { key: string; file: OpenFile; opened: OpenedInput } | null = null;

/**
 * Opens a file as it was queued, hands it to `use`, and makes sure that it is still the same afterwards.
 *
 * @throws InputFault what opening throws, and `file-changed`, `file-missing`
 */
export function withInput<T>(input: TaskInput, use: (opened: OpenedInput) => T): T {
  checkUnchanged(input.path, input.label, input.state);
  const key = `${input.path}\n${input.state.sizeBytes}\n${input.state.modifiedMs}\n${input.state.inode}`;
  if (kept?.key !== key) {
    kept?.file.close();
    kept = null;
    const file = openFile(input.path, input.label);
    try {
      kept = { key, file, opened: openInput(file.source, DEFAULT_READ_LIMITS) };
    } catch (error) {
      file.close();
      throw error;
    }
  }
  const result = use(kept.opened);
  checkUnchanged(input.path, input.label, input.state);
  return result;
}

function unreadable(fault: InputFault): Fault {
  return { word: 'unreadable', code: fault.code, detail: fault.message };
}

function factsOf(spectrum: Spectrum): SpectrumFacts {
  const { targetName, raDeg, decDeg, field, exposureId, fibre, role, targetClass } = spectrum;
  const { observedAt, exposureS, magnitude, magnitudeBand, frame, site } = spectrum;
  return {
    ...{ targetName, raDeg, decDeg, field, exposureId, fibre, role, targetClass },
    ...{ observedAt, exposureS, magnitude, magnitudeBand, frame, site },
  };
}
