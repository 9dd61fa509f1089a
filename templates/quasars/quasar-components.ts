import type { Component, LogGrid } from '../family.ts';
import type { Population } from '../galaxies/population-set.ts';
import { intergalacticTransmission } from '../intergalactic/madau.ts';
import { STRONG_GROUPS, WEAK_GROUPS } from '../lines/emission-groups.ts';
import { REST_WAVELENGTHS } from '../lines/rest-wavelengths.ts';
import { LIGHT_SPEED_KM_S } from '../physics/constants.ts';
import { broaden, missingWidthKmS } from '../prepare/broaden.ts';
import { componentOf, lineComponent, present } from '../prepare/component.ts';
import { wavelengthsOf } from '../prepare/log-grid.ts';
import { STORED_SIGMA_KM_S } from '../prepare/star-grid.ts';
import { toUnitPeak } from '../prepare/unit-rows.ts';
import { balmerContinuum } from './balmer-continuum.ts';
import { broadLineComponents } from './broad-lines.ts';
import { HOST_OFFSET, QUASAR_GRID } from './grid.ts';

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
/** The transmission of the forest is renewed in steps of this in redshift; below the first it is left out. */
const ABSORPTION_STEP = 0.1;
const ABSORPTION_FROM = 1.7;
/** Absorbed versions kept: a refit walks a few steps back and forth; one version is about 3 MB. */
const KEPT_VERSIONS = 12;

/**
 * The components of the quasar refit as a function of redshift.
 *
 * @param iron stored blend on {@link QUASAR_GRID}, sharp
 * @param populations hosts are taken from these by name
 * @param lineSpreadKmS Gaussian sigma of the instrument
 */
export function quasarComponents(
  iron: Float32Array,
  populations: readonly Population[],
  lineSpreadKmS: number,
): (redshift: number) => readonly Component[] {
  const wavelengths = wavelengthsOf(QUASAR_GRID);
  const clear = [
    ...powerLaws(wavelengths),
    ...broadLineComponents(QUASAR_GRID, lineSpreadKmS),
    ...ironComponents(iron, wavelengths),
    componentOf('balmer continuum', 'balmer-continuum', '', toUnitPeak(balmerContinuum(QUASAR_GRID))),
    ...narrowComponents(QUASAR_GRID, lineSpreadKmS),
    ...hostComponents(populations, lineSpreadKmS),
  ];
  const versions = new Map<number, readonly Component[]>();
  return (redshift) => {
    if (redshift < ABSORPTION_FROM) return clear;
    const step = Math.round(redshift / ABSORPTION_STEP);
    const known = versions.get(step) ?? absorbed(clear, wavelengths, step * ABSORPTION_STEP);
    // Re-inserting moves it to the end: the first key is the one unused for longest.
    versions.delete(step);
    versions.set(step, known);
    if (versions.size > KEPT_VERSIONS) versions.delete(versions.keys().next().value!);
    return known;
  };
}

/** Components with light blueward of Lyα seen through the forest; the others are shared. */
function absorbed(
  components: readonly Component[],
  wavelengths: Float64Array,
  redshift: number,
): readonly Component[] {
  let reach = 0;
  while (reach < wavelengths.length && wavelengths[reach]! < REST_WAVELENGTHS.hydrogenLymanAlpha) reach++;
  const through = Float64Array.from(wavelengths.subarray(0, reach), (wavelength) =>
    intergalacticTransmission(wavelength, redshift),
  );
  return components.map((component) => {
    if (component.first >= reach) return component;
    const flux = component.flux.slice();
    for (let i = component.first; i < Math.min(reach, component.end); i++) flux[i]! *= through[i]!;
    return { ...component, flux };
  });
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

function hostComponents(populations: readonly Population[], lineSpreadKmS: number): Component[] {
  const width = missingWidthKmS(Math.hypot(HOST_SIGMA_KM_S, lineSpreadKmS), STORED_SIGMA_KM_S);
  const sigma = width / LIGHT_SPEED_KM_S / QUASAR_GRID.step;
  return HOSTS.map((name) => {
    const host = populations.find((population) => population.name === name);
    if (!host) throw new RangeError(`populations must hold the host ${name}, got none of that name`);
    const flux = new Float32Array(QUASAR_GRID.length);
    flux.set(broaden(host.flux, sigma).subarray(0, flux.length - HOST_OFFSET), HOST_OFFSET);
    return componentOf(`host ${name}`, 'host', '', toUnitPeak(flux));
  });
}
