import { starburstAttenuation } from '../dust/starburst.ts';
import { behindDust } from '../dust/transmission.ts';
import type { Component, Family, LogGrid } from '../family.ts';
import { absorbedWithRedshift } from '../intergalactic/absorbed-components.ts';
import { intergalacticTransmission } from '../intergalactic/madau.ts';
import { DISTANT_GROUPS } from '../lines/emission-groups.ts';
import { dampedLymanAlpha, interstellarTransmission } from '../lines/interstellar.ts';
import { broaden, missingWidthKmS } from '../prepare/broaden.ts';
import { componentOf, lineComponent, present } from '../prepare/component.ts';
import {
  averagePairs,
  gridThrough,
  laidInto,
  pairedGrid,
  stepKmS,
  wavelengthsOf,
} from '../prepare/log-grid.ts';
import { principalVectors } from '../prepare/principal-vectors.ts';
import { neededForMixtures } from '../prepare/prune.ts';
import { toUnitRms } from '../prepare/unit-rows.ts';
import { STORED_GRID, STORED_SIGMA_KM_S } from '../stars/stored-grid.ts';
import type { PopulationSet } from './population-set.ts';
import { withFarUltraviolet } from './far-ultraviolet.ts';

/**
 * From the Lyman continuum, where nothing is left beyond redshift 3, to what a spectrum that ends at 10,500 Å
 * shows at redshift 1.5.
 */
const GRID: LogGrid = gridThrough(STORED_GRID, 880, 4300);
/** Ranges of redshift searched with one set of vectors each: the forest deepens with redshift. */
const WINDOWS = [
  { from: 1.5, to: 2.6 },
  { from: 2.6, to: 3.8 },
  { from: 3.8, to: 6.5 },
];
/** Only stars younger than this (10⁹ years) are bright in the ultraviolet. */
const OLDEST = 0.35;
/** Interstellar gas in front: none, and one and a half times the mean composite. */
const GAS = [0, 1.5];
/** Attenuation by dust, A(V) magnitudes. */
const ATTENUATIONS = [0, 0.5, 1.2];
/** Velocity dispersion of the stars, km/s. */
const STELLAR_SIGMA_KM_S = 150;
/** Emission widths, km/s: nebular lines; Lyα is widened by scattering (Shapley et al. 2003). */
const LINE_WIDTHS = [90, 300];
const CONTINUUM_VECTORS = 3;
const PRUNE_TOLERANCE = 0.02;
/** Interstellar lines and Lyα profile vary from galaxy to galaxy more than stars do (judged, not measured). */
const MISMATCH = 0.04;

/** What does not depend on the line spread: young starlight behind gas and dust, at the stored sharpness. */
export interface PreparedDistantGalaxies {
  readonly starlight: readonly { readonly label: string; readonly flux: Float32Array }[];
}

/** Extends the young populations into the far ultraviolet and puts gas and dust in front of them. */
export function prepareDistantGalaxies({ grid, populations }: PopulationSet): PreparedDistantGalaxies {
  const wavelengths = wavelengthsOf(GRID);
  const starlight = populations
    .filter(({ age }) => age < OLDEST)
    .flatMap(({ name, flux }) => {
      const extended = withFarUltraviolet(GRID, laidInto(GRID, grid, flux), Math.exp(grid.lnStart));
      return GAS.flatMap((strength) => {
        const gas = interstellarTransmission(GRID, strength);
        const hydrogen = dampedLymanAlpha(GRID, strength);
        const seen = extended.map((value, i) => value * gas[i]! * hydrogen[i]!);
        return ATTENUATIONS.map((amount) => ({
          label: `${name} gas${strength} av${amount}`,
          flux: behindDust(seen, wavelengths, starburstAttenuation, amount),
        }));
      });
    });
  const needed = neededForMixtures(
    starlight.map(({ flux }) => averagePairs(averagePairs(flux))),
    PRUNE_TOLERANCE,
  );
  return { starlight: needed.map((k) => starlight[k]!) };
}

/**
 * Galaxies whose ultraviolet light is seen, `galaxy-distant-1.5` to `galaxy-distant-3.8`: young stars behind
 * interstellar gas and intergalactic hydrogen, with Lyα and ultraviolet emission lines.
 *
 * @param lineSpreadKmS Gaussian sigma of the instrument
 */
export function distantGalaxyFamilies(
  { starlight }: PreparedDistantGalaxies,
  lineSpreadKmS: number,
): Family[] {
  const target = Math.hypot(STELLAR_SIGMA_KM_S, lineSpreadKmS);
  const sigma = missingWidthKmS(target, STORED_SIGMA_KM_S) / stepKmS(GRID);
  const continua = starlight.map(({ label, flux }) =>
    componentOf(label, 'continuum', '', broaden(flux, sigma)),
  );
  const lines = lineComponents(lineSpreadKmS);
  const componentsAt = absorbedWithRedshift([...continua, ...lines], GRID, 0);
  const searchGrid = pairedGrid(GRID);
  const wavelengths = wavelengthsOf(searchGrid);
  const lymanAlpha = toUnitRms(averagePairs(lines[0]!.flux));
  return WINDOWS.map(({ from, to }) => {
    const through = wavelengths.map((wavelength) => intergalacticTransmission(wavelength, 0.5 * (from + to)));
    const rows = continua.map(({ flux }) =>
      toUnitRms(averagePairs(flux).map((value, i) => value * through[i]!)),
    );
    return {
      name: `galaxy-distant-${from.toFixed(1)}`,
      kind: 'galaxy',
      grid: searchGrid,
      componentGrid: GRID,
      basis: [...principalVectors(rows, CONTINUUM_VECTORS), lymanAlpha],
      redshiftMin: from,
      redshiftMax: to,
      refitSet: 'galaxy-distant',
      componentsAt,
      multiplicativeOrder: 2,
      additiveOrder: -1,
      mismatch: MISMATCH,
    };
  });
}

/** Every group in every width; the first is Lyα, narrow. */
function lineComponents(lineSpreadKmS: number): Component[] {
  return present(
    DISTANT_GROUPS.flatMap((group) =>
      LINE_WIDTHS.map((width) =>
        lineComponent(GRID, group, 'narrow-line', ` ${width}`, Math.hypot(width, lineSpreadKmS)),
      ),
    ),
  );
}
