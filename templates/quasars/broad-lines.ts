import type { Component, LogGrid } from '../family.ts';
import type { EmissionGroup, GroupLine } from '../lines/emission-groups.ts';
import { LIGHT_SPEED_KM_S } from '../physics/constants.ts';
import { lineComponent, present } from '../prepare/component.ts';

/** A broad line (or close blend) as the refit offers it. */
interface BroadLine {
  readonly group: string;
  /** Main lines: wavelength in vacuum Å and flux relative to the first. */
  readonly lines: readonly GroupLine[];
  /** Offered in all widths, or in the middle one only when weak. */
  readonly widths: 'all' | 'middle';
  /** Groups that must come along, with the least flux they have relative to the first main line. */
  readonly companions: readonly { readonly group: string; readonly least: number }[];
}

const line = (wavelength: number, flux = 1): GroupLine => ({ wavelength, flux });

/**
 * Broad lines at the wavelengths of the composite (Vanden Berk et al. 2001, table 2, from memory).
 *
 * Why companions: with every line free, Mg II alone passes for Lyα alone. Each strong line therefore brings its
 * neighbours at about a fifth of their flux ratio in the composite (relative fluxes there: Lyα 100, C IV 25,
 * C III] 16, Mg II 15, Hβ 9); any non-negative mixture then keeps every ratio within a factor five of the mean
 * on both sides, more than quasars scatter.
 */
const BROAD_LINES: readonly BroadLine[] = [
  { group: 'oxygen6-broad', lines: [line(1033.8)], widths: 'all', companions: [] },
  {
    group: 'lyman-alpha',
    lines: [line(1216.4)],
    widths: 'all',
    companions: [
      { group: 'nitrogen5', least: 0.03 },
      { group: 'carbon4', least: 0.05 },
    ],
  },
  { group: 'nitrogen5', lines: [line(1240.1)], widths: 'all', companions: [] },
  { group: 'oxygen1-broad', lines: [line(1305), line(1335.3, 0.4)], widths: 'middle', companions: [] },
  { group: 'silicon4', lines: [line(1397)], widths: 'all', companions: [] },
  {
    group: 'carbon4',
    lines: [line(1547)],
    widths: 'all',
    companions: [
      { group: 'lyman-alpha', least: 0.8 },
      { group: 'carbon3-broad', least: 0.12 },
    ],
  },
  { group: 'helium2-broad', lines: [line(1638.5), line(1664.7, 0.7)], widths: 'all', companions: [] },
  { group: 'aluminium3', lines: [line(1857.5), line(1891.5)], widths: 'middle', companions: [] },
  {
    group: 'carbon3-broad',
    lines: [line(1906.5), line(1890, 0.15)],
    widths: 'all',
    companions: [
      { group: 'carbon4', least: 0.3 },
      { group: 'magnesium2', least: 0.18 },
    ],
  },
  {
    group: 'magnesium2',
    lines: [line(2799)],
    widths: 'all',
    companions: [
      { group: 'carbon3-broad', least: 0.2 },
      { group: 'balmer-broad', least: 0.12 },
    ],
  },
  {
    group: 'balmer-broad',
    lines: [line(4862.7), line(6564.6, 3.2), line(4341.7, 0.42), line(4102.9, 0.22), line(3971.2, 0.1)],
    widths: 'all',
    companions: [{ group: 'magnesium2', least: 0.3 }],
  },
  { group: 'helium1-broad', lines: [line(5877.2)], widths: 'middle', companions: [] },
  { group: 'helium2-optical', lines: [line(4687)], widths: 'middle', companions: [] },
];

/** Widths offered, km/s (standard deviation): the range of broad lines, mixtures fill in between. */
const WIDTHS = [900, 1800, 3600];
const MIDDLE_WIDTH = 1800;
/** A blueshifted C IV, offered beside the one at rest: shift and width, km/s (Richards et al. 2002). */
const BLUESHIFTS = [1000, 2000];
const BLUESHIFTED_WIDTH = 2200;
const CARBON4_REST = 1549.06;

/** The broad lines of the refit, each with its companions, peak 1. */
export function broadLineComponents(grid: LogGrid, lineSpreadKmS: number): Component[] {
  const drawn = BROAD_LINES.flatMap((each) =>
    (each.widths === 'all' ? WIDTHS : [MIDDLE_WIDTH]).map((width) =>
      lineComponent(grid, withCompanions(each), 'broad-line', ` ${width}`, Math.hypot(width, lineSpreadKmS)),
    ),
  );
  const carbon4 = BROAD_LINES.find(({ group }) => group === 'carbon4')!;
  const blueshifted = BLUESHIFTS.map((shift) => {
    const moved = { ...carbon4, lines: [line(CARBON4_REST * (1 - shift / LIGHT_SPEED_KM_S))] };
    const sigma = Math.hypot(BLUESHIFTED_WIDTH, lineSpreadKmS);
    return lineComponent(grid, withCompanions(moved), 'broad-line', ` blue ${shift}`, sigma);
  });
  return present([...drawn, ...blueshifted]);
}

function withCompanions({ group, lines, companions }: BroadLine): EmissionGroup {
  const along = companions.flatMap(({ group: name, least }) => {
    const companion = BROAD_LINES.find((other) => other.group === name)!;
    return companion.lines.map(({ wavelength, flux }) => line(wavelength, flux * least));
  });
  return { label: group, group, lines: [...lines, ...along] };
}
