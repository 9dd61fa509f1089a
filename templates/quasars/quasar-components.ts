import type { Component, LogGrid } from '../family.ts';
import { withFarUltraviolet } from '../galaxies/far-ultraviolet.ts';
import type { PopulationSet } from '../galaxies/population-set.ts';
import { absorbedWithRedshift } from '../intergalactic/absorbed-components.ts';
import { QUASAR_PROXIMITY_KM_S } from '../intergalactic/madau.ts';
import { STRONG_GROUPS, WEAK_GROUPS } from '../lines/emission-groups.ts';
import { REST_WAVELENGTHS } from '../lines/rest-wavelengths.ts';
import { LIGHT_SPEED_KM_S } from '../physics/constants.ts';
import { broaden, missingWidthKmS } from '../prepare/broaden.ts';
import { componentOf, lineComponent, present } from '../prepare/component.ts';
import { laidInto, wavelengthsOf } from '../prepare/log-grid.ts';
import { STORED_SIGMA_KM_S } from '../stars/stored-grid.ts';
import { toUnitPeak } from '../prepare/unit-rows.ts';
import { balmerContinuum } from './balmer-continuum.ts';
import { broadLineComponents } from './broad-lines.ts';
import { QUASAR_GRID } from './grid.ts';

/** Slopes of f_λ offered as continuum: blue to red quasars, mixtures make curved ones. */
const SLOPES = [-2.6, -1.9, -1.2, -0.4];
const SLOPE_PIVOT = 3000;
/** Extra width the iron blend gets on top of the stored one, km/s. */
const IRON_EXTRA_KM_S = 1800;
/** Iron below and above this wavelength may have different strengths, ångström. */
const IRON_DIVIDE = 3600;
/** Width of lines from the narrow-line region, km/s (standard deviation). */
const NARROW_SIGMA_KM_S = 180;
/** Narrow groups of a quasar; the others are too weak beside the continuum. */
const NARROW_GROUPS: ReadonlySet<string> = new Set([
  'balmer',
  'oxygen2-sparse',
  'oxygen3',
  'nitrogen2',
  'sulphur2-sparse',
  'neon3',
]);
/** Host galaxies: old, middle-aged, young. */
const HOSTS: readonly string[] = ['10g-solar', '1g-solar', '30m-solar'];
const HOST_SIGMA_KM_S = 170;

/**
 * The components of the quasar refit as a function of redshift.
 *
 * @param iron stored blend on {@link QUASAR_GRID}, sharp
 * @param hosts host galaxies are taken from these by name
 * @param lineSpreadKmS Gaussian sigma of the instrument
 */
export function quasarComponents(
  iron: Float32Array,
  hosts: PopulationSet,
  lineSpreadKmS: number,
): (redshift: number) => readonly Component[] {
  const wavelengths = wavelengthsOf(QUASAR_GRID);
  const clear = [
    ...powerLaws(wavelengths),
    ...broadLineComponents(QUASAR_GRID, lineSpreadKmS),
    ...ironComponents(iron, wavelengths),
    componentOf('balmer continuum', 'balmer-continuum', '', toUnitPeak(balmerContinuum(QUASAR_GRID))),
    ...narrowComponents(QUASAR_GRID, lineSpreadKmS),
    ...hostComponents(hosts, lineSpreadKmS),
  ];
  return absorbedWithRedshift(clear, QUASAR_GRID, QUASAR_PROXIMITY_KM_S);
}

function powerLaws(wavelengths: Float64Array): Component[] {
  return SLOPES.map((slope) =>
    componentOf(
      `power law ${slope}`,
      'continuum',
      '',
      toUnitPeak(Float32Array.from(wavelengths, (wavelength) => (wavelength / SLOPE_PIVOT) ** slope)),
    ),
  );
}

function ironComponents(iron: Float32Array, wavelengths: Float64Array): Component[] {
  const blend = broaden(iron, IRON_EXTRA_KM_S / LIGHT_SPEED_KM_S / QUASAR_GRID.step);
  const part = (label: string, belongs: (wavelength: number) => boolean): Component =>
    componentOf(
      label,
      'iron',
      '',
      toUnitPeak(blend.map((value, i) => (belongs(wavelengths[i]!) ? value : 0))),
    );
  return [
    part('iron ultraviolet', (wavelength) => wavelength < IRON_DIVIDE),
    part('iron optical', (wavelength) => wavelength >= IRON_DIVIDE),
  ];
}

function narrowComponents(grid: LogGrid, lineSpreadKmS: number): Component[] {
  const groups = [...STRONG_GROUPS, ...WEAK_GROUPS].filter(({ label }) => NARROW_GROUPS.has(label));
  // [Ne V] 3426/3346 = 2.73 from radiative rates (NIST).
  const neon5 = {
    label: 'neon5',
    group: 'neon5',
    lines: [
      { wavelength: REST_WAVELENGTHS.neonV3426, flux: 1 },
      { wavelength: REST_WAVELENGTHS.neonV3346, flux: 1 / 2.73 },
    ],
  };
  const sigma = Math.hypot(NARROW_SIGMA_KM_S, lineSpreadKmS);
  return present([...groups, neon5].map((group) => lineComponent(grid, group, 'narrow-line', '', sigma)));
}

function hostComponents(hosts: PopulationSet, lineSpreadKmS: number): Component[] {
  const width = missingWidthKmS(Math.hypot(HOST_SIGMA_KM_S, lineSpreadKmS), STORED_SIGMA_KM_S);
  const sigma = width / LIGHT_SPEED_KM_S / QUASAR_GRID.step;
  return HOSTS.map((name) => {
    const host = hosts.populations.find((population) => population.name === name);
    if (!host) throw new RangeError(`populations must hold the host ${name}, got none of that name`);
    const stored = laidInto(QUASAR_GRID, hosts.grid, broaden(host.flux, sigma));
    const flux = withFarUltraviolet(QUASAR_GRID, stored, Math.exp(hosts.grid.lnStart));
    return componentOf(`host ${name}`, 'host', '', toUnitPeak(flux));
  });
}
