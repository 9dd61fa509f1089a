import { readSpectra, type Spectrum } from '../pipeline/decode/index.ts';
import { InputFault } from '../pipeline/errors.ts';
import { type ExposureContext, exposureContext } from '../pipeline/grid/index.ts';
import { withInput } from './measure-chunk.ts';
import type { ExposureTask } from './measure-contract.ts';

/** Medians over this many sky spectra are settled; more would only cost memory. */
const MOST_SKY_SPECTRA = 64;

/**
 * Reads the spectra of one exposure, file by file and row by row, and says what its sky fibres tell about
 * the noise. Rows and files that cannot be read are passed over here; their own rows will say so.
 *
 * @param onSpectrum called after each spectrum
 */
export function contextOfExposure(task: ExposureTask, onSpectrum: () => void): ExposureContext {
  const sky: Spectrum[] = [];
  for (const input of task.inputs) {
    try {
      withInput(input, (opened) => {
        for (const { ordinal } of input.spectra) {
          if (sky.length >= MOST_SKY_SPECTRA) return;
          const [spectrum] = readSpectra(opened, input.layout, ordinal, 1);
          onSpectrum();
          if (spectrum !== undefined && !(spectrum instanceof InputFault) && spectrum.role === 'sky') {
            sky.push(spectrum);
          }
        }
      });
    } catch (error) {
      if (!(error instanceof InputFault)) throw error;
    }
  }
  return exposureContext(sky);
}
