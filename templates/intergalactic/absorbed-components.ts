import type { Component, LogGrid } from '../family.ts';
import { REST_WAVELENGTHS } from '../lines/rest-wavelengths.ts';
import { wavelengthsOf } from '../prepare/log-grid.ts';
import { intergalacticTransmission } from './madau.ts';

/** The transmission is renewed in steps of this in redshift: it changes by less than 5 per cent in one. */
const STEP = 0.1;
/** Below this redshift the forest lies outside optical spectra and is left out. */
const ABSORBED_FROM = 1.7;
/** Versions kept: a refit walks a few steps back and forth; one version is about 3 MB. */
const KEPT_VERSIONS = 12;

/**
 * Components as seen through the mean intergalactic hydrogen in front of their redshift. The last dozen
 * redshift steps are kept.
 *
 * @param clear components as emitted, on `grid`
 * @param proximityKmS how far the sources thin out the hydrogen around them; 0 = not at all
 * @returns the components at a redshift; those without light blueward of Lyα are shared by all redshifts
 */
export function absorbedWithRedshift(
  clear: readonly Component[],
  grid: LogGrid,
  proximityKmS: number,
): (redshift: number) => readonly Component[] {
  const wavelengths = wavelengthsOf(grid).filter(
    (wavelength) => wavelength < REST_WAVELENGTHS.hydrogenLymanAlpha,
  );
  const versions = new Map<number, readonly Component[]>();
  return (redshift) => {
    if (redshift < ABSORBED_FROM) return clear;
    const step = Math.round(redshift / STEP);
    const known = versions.get(step) ?? absorbed(clear, wavelengths, step * STEP, proximityKmS);
    // Re-inserting moves it to the end: the first key is the one unused for longest.
    versions.delete(step);
    versions.set(step, known);
    if (versions.size > KEPT_VERSIONS) versions.delete(versions.keys().next().value!);
    return known;
  };
}

function absorbed(
  components: readonly Component[],
  blueward: Float64Array,
  redshift: number,
  proximityKmS: number,
): readonly Component[] {
  const through = blueward.map((wavelength) => intergalacticTransmission(wavelength, redshift, proximityKmS));
  return components.map((component) => {
    if (component.first >= through.length) return component;
    const flux = component.flux.slice();
    const end = Math.min(through.length, component.end);
    for (let i = component.first; i < end; i++) flux[i]! *= through[i]!;
    return { ...component, flux };
  });
}
