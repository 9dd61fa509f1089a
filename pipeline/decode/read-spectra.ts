import { InputFault } from '../errors.ts';
import type { FaultPlace } from '../errors.ts';
import { buildArm } from './build-arm.ts';
import type { BuiltArm } from './build-arm.ts';
import type { Layout } from './layout.ts';
import { exposuresOf, observationOf } from './observation.ts';
import type { Observation } from './observation.ts';
import type { OpenedInput } from './open-input.ts';
import type { Spectrum } from './spectrum.ts';
import { targetRowOf } from './target-row.ts';
import type { TargetRow } from './target-row.ts';

/** A redshift from fewer pixels than this is a guess about nothing: not even one line and its continuum fit. */
export const FEWEST_USABLE_PIXELS = 10;

/**
 * Read spectra: one result per row, in order. A row that cannot be used comes back as its fault and leaves its
 * neighbours alone.
 *
 * @param input the opened file
 * @param layout from `recogniseLayout` of the same file
 * @param first first row, 0-based
 * @param count rows, >= 0; all must lie inside `layout.rowCount`
 * @returns `count` results
 * @throws RangeError when rows outside the layout are asked for
 */
export function readSpectra(
  input: OpenedInput,
  layout: Layout,
  first: number,
  count: number,
): (Spectrum | InputFault)[] {
  checkRows(layout, first, count);
  const observation = observationOf(input.file, layout);
  return Array.from({ length: count }, (_, i) => {
    try {
      return readOne(input, layout, observation, first + i);
    } catch (error) {
      if (error instanceof InputFault) return error;
      throw error;
    }
  });
}

function readOne(input: OpenedInput, layout: Layout, observation: Observation, row: number): Spectrum {
  const { file, limits } = input;
  const place: FaultPlace = { file: file.label, hdu: layout.arms[0]!.flux.hdu, row };
  const built = layout.arms
    .map((arm) => buildArm(file, layout, arm, row))
    .sort((a, b) => a.arm.wavelengthVacuumAngstrom[0]! - b.arm.wavelengthVacuumAngstrom[0]!);
  checkPixels(built, limits.pixelsPerSpectrum, place);
  const target = targetRowOf(file, layout, row);
  const holdsOne = layout.rowCount === 1;
  const name = target.name ?? (holdsOne ? observation.object : null);
  const time = exposuresOf(file, layout, target.name) ?? observation.time;
  // A position in the header of a file with many targets is where the telescope pointed.
  const position =
    target.raDeg !== null && target.decDeg !== null
      ? [target.raDeg, target.decDeg]
      : holdsOne
        ? [observation.raDeg, observation.decDeg]
        : [null, null];
  return {
    inputHdu: layout.arms[0]!.flux.hdu,
    inputRow: layout.form === 'row-stack' || layout.form === 'table-row-per-spectrum' ? row : null,
    arms: built.map(({ arm }) => arm),
    frame: layout.frame,
    appliedCorrectionKmS: observation.appliedCorrectionKmS,
    observedAt: time.observedAt,
    exposureS: time.exposureS,
    coaddedOverNights: time.coaddedOverNights,
    site: observation.site,
    raDeg: position[0] ?? null,
    decDeg: position[1] ?? null,
    targetName: name,
    field: holdsOne ? null : observation.object,
    exposureId: observation.exposureId,
    fibre: target.fibre ?? (holdsOne ? observation.fibre : null),
    role: target.role ?? (holdsOne ? observation.role : null) ?? 'target',
    targetClass: target.targetClass,
    magnitude: target.magnitude,
    magnitudeBand: target.magnitude === null ? null : target.magnitudeBand,
    notes: [
      ...observation.notes,
      ...(time === observation.time ? [] : time.notes),
      ...built.flatMap((b) => b.notes),
    ],
  };
}

function checkPixels(built: readonly BuiltArm[], most: number, place: FaultPlace): void {
  let pixels = 0;
  let usable = 0;
  for (const { arm } of built) {
    pixels += arm.flux.length;
    for (const weight of arm.inverseVariance) if (weight > 0) usable += 1;
  }
  if (pixels > most) {
    const detail = `a spectrum must have at most ${most} pixels (pixelsPerSpectrum), got ${pixels}`;
    throw new InputFault('too-many-pixels', place, detail);
  }
  if (usable === 0) {
    throw new InputFault('no-usable-pixels', place, `some of ${pixels} pixels must be usable, got none`);
  }
  if (usable < FEWEST_USABLE_PIXELS) {
    const detail = `at least ${FEWEST_USABLE_PIXELS} pixels must be usable, got ${usable}`;
    throw new InputFault('too-few-pixels', place, detail);
  }
}

/**
 * What the file says each spectrum is of, without reading a pixel: for planning, and for naming spectra that turn out
 * to be unreadable.
 *
 * @returns one entry per row of `first .. first+count-1`; role is null where the file does not say
 * @throws RangeError when rows outside the layout are asked for
 */
export function readTargets(input: OpenedInput, layout: Layout, first: number, count: number): TargetRow[] {
  checkRows(layout, first, count);
  return Array.from({ length: count }, (_, i) => targetRowOf(input.file, layout, first + i));
}

function checkRows(layout: Layout, first: number, count: number): void {
  if (first >= 0 && count >= 0 && first + count <= layout.rowCount) return;
  throw new RangeError(`rows ${first}..${first + count} must lie in 0..${layout.rowCount}`);
}
