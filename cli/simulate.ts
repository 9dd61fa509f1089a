import { mkdir, open, rename, stat, writeFile } from 'node:fs/promises';
import { dirname, join } from 'node:path';
import { type Command, InvalidArgumentError } from 'commander';
import { UsageFault } from './exit-status.ts';
import type { NightExposure, SimulatedTruth } from '../simulate/index.ts';

interface SimulateOptions {
  readonly out: string;
  readonly seed?: number;
  readonly nights?: number;
  readonly fields?: number;
  readonly fibres?: number;
}

/** `shiftwork simulate`: writes practice nights of the Larkfield survey and, apart from them, their truth. */
export function registerSimulate(program: Command): void {
  program
    .command('simulate')
    .description('make practice nights of the invented Larkfield survey, with known truth')
    .requiredOption('--out <folder>', 'where the nights and truth.csv go')
    .option('--seed <number>', 'whole number; the same seed gives the same files', wholeNumber)
    .option('--nights <number>', 'observing nights', wholeNumber)
    .option('--fields <number>', 'fields per night, each exposed three times', wholeNumber)
    .option('--fibres <number>', 'fibres per field, up to 240', wholeNumber)
    .addHelpText(
      'after',
      '\nExample:\n  shiftwork simulate --out practice --fibres 80\n  shiftwork run practice/2031-04-02',
    )
    .action(async (options: SimulateOptions) => {
      await simulate(options);
    });
}

async function simulate({ out, ...chosen }: SimulateOptions): Promise<void> {
  const truthFile = join(out, 'truth.csv');
  if (await exists(truthFile)) {
    throw new UsageFault(`--out must be a folder without a practice night, but ${truthFile} exists`);
  }
  const { DEFAULT_SURVEY, HARROW_FELL, makersFrom, simulateNights, truthCsv, truthOf } = await import(
    '../simulate/index.ts'
  );
  const { starsFromFile } = await import('../templates/prepare/file-contents.ts');
  const { barycentricVelocityKmS } = await import('../pipeline/measure/barycentric.ts');
  const { installedFile } = await import('./installed-families.ts');
  const makers = makersFrom(starsFromFile(installedFile('stars.fits')));
  const observerVelocity = (midMjd: number, raDeg: number, decDeg: number): number =>
    barycentricVelocityKmS(midMjd, HARROW_FELL, raDeg, decDeg);

  const truth: SimulatedTruth[] = [];
  try {
    for (const exposure of simulateNights({ ...DEFAULT_SURVEY, ...chosen }, makers, observerVelocity)) {
      await writeExposure(out, exposure);
      truth.push(...truthOf(exposure));
    }
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    throw new UsageFault(error.message);
  }
  // Written last: a folder with a truth table is whole.
  await writeFile(truthFile, truthCsv(truth));
  console.log(`${truthFile}: truth of ${truth.length} spectra`);
}

/** Under another name until it is whole, so that nobody measures half a file by mistake. */
async function writeExposure(out: string, { night, file, exposure, keep }: NightExposure): Promise<void> {
  const { encodeExposure } = await import('../simulate/index.ts');
  const path = join(out, night, file);
  await mkdir(dirname(path), { recursive: true });
  const chunks = [...encodeExposure(exposure)];
  const whole = chunks.reduce((sum, chunk) => sum + chunk.length, 0);
  let left = Math.floor(keep * whole);
  const handle = await open(`${path}.part`, 'w');
  try {
    for (const chunk of chunks) {
      await handle.write(chunk.subarray(0, left));
      left = Math.max(0, left - chunk.length);
    }
  } finally {
    await handle.close();
  }
  await rename(`${path}.part`, path);
  const note = keep < 1 ? ', broken off on purpose' : '';
  console.log(`${path}: ${exposure.field.aims.length} fibres of field ${exposure.field.name}${note}`);
}

async function exists(path: string): Promise<boolean> {
  try {
    await stat(path);
    return true;
  } catch {
    return false;
  }
}

function wholeNumber(text: string): number {
  const value = Number(text);
  if (!Number.isInteger(value)) throw new InvalidArgumentError('must be a whole number.');
  return value;
}
