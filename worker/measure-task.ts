import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { ExposureContext } from '../pipeline/grid/index.ts';
import { measureSpectrum } from '../pipeline/index.ts';
import { type FamilyLibrary, loadFamilyLibrary } from '../templates/library.ts';
import { measureChunk } from './measure-chunk.ts';
import { type ChunkResult, countStep, type ThreadTask } from './measure-contract.ts';
import { FAMILY_FILES, familyFolder } from './recipe.ts';
import { contextOfExposure } from './sky-of-exposure.ts';

/** What runs inside a thread of the pool. The family library is loaded by the thread's first chunk and kept. */

let library: FamilyLibrary | null = null;

function loadedLibrary(): FamilyLibrary {
  if (library === null) {
    const file = (name: string) => new Uint8Array(readFileSync(join(familyFolder(), name)));
    library = loadFamilyLibrary({
      stars: file(FAMILY_FILES.stars),
      populations: file(FAMILY_FILES.populations),
      quasars: file(FAMILY_FILES.quasars),
    });
  }
  return library;
}

/**
 * The thread's one entry: the pool loads TypeScript only through a default export.
 *
 * @returns a ChunkResult for a chunk, an ExposureContext for an exposure
 */
export default function runTask(task: ThreadTask): ChunkResult | ExposureContext {
  const step = () => {
    countStep(task.beat);
  };
  step();
  if (task.kind === 'exposure') return contextOfExposure(task, step);
  const families = loadedLibrary();
  step();
  return measureChunk(
    task,
    (spectrum, context, options, onStage) => measureSpectrum(spectrum, context, families, options, onStage),
    () => performance.now(),
    step,
  );
}
