import type { Component, ComponentRole, LogGrid } from '../family.ts';
import { drawLines } from '../lines/render.ts';
import type { EmissionGroup } from '../lines/emission-groups.ts';
import { toUnitPeak } from './unit-rows.ts';

/**
 * A component from a spectrum, with the extent of its light worked out.
 *
 * @param flux on the component grid, any positive scale, not zero everywhere
 */
export function componentOf(
  label: string,
  role: ComponentRole,
  group: string,
  flux: Float32Array,
): Component {
  let first = 0;
  while (first < flux.length && flux[first] === 0) first++;
  let end = flux.length;
  while (end > first && flux[end - 1] === 0) end--;
  return { label, role, group, flux, first, end };
}

/**
 * A group of lines as a component with peak 1.
 *
 * @param labelSuffix appended to the group's label, to tell widths apart
 * @param sigmaKmS velocity width including the line spread
 * @returns null when none of its lines lies on the grid
 */
export function lineComponent(
  grid: LogGrid,
  emission: EmissionGroup,
  role: ComponentRole,
  labelSuffix: string,
  sigmaKmS: number,
): Component | null {
  const { flux, first, end } = drawLines(grid, emission.lines, sigmaKmS);
  if (end === 0) return null;
  return {
    label: emission.label + labelSuffix,
    role,
    group: emission.group,
    flux: toUnitPeak(flux),
    first,
    end,
  };
}

/** Leaves out what is null. */
export function present<T>(items: readonly (T | null)[]): T[] {
  return items.filter((item): item is T => item !== null);
}
