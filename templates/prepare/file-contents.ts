import { bytesInMemory } from '../../pipeline/decode/byte-source.ts';
import { DEFAULT_READ_LIMITS, readFits } from '../../pipeline/decode/fits/index.ts';
import { InputFault } from '../../pipeline/errors.ts';
import type { PopulationSet } from '../galaxies/population-set.ts';
import { POPULATIONS } from '../galaxies/population.ts';
import { QUASAR_SEARCH_GRID } from '../quasars/grid.ts';
import type { QuasarSet } from '../quasars/quasar-set.ts';
import type { StarGroup } from '../stars/parameters.ts';
import { STORED_GRID } from '../stars/stored-grid.ts';
import { type ReadSpectra, readSpectra } from './read-spectra.ts';
import { encodeSpectra } from './spectra-file.ts';
import type { StarGrid } from './star-grid.ts';

const STAR_GROUPS: readonly StarGroup[] = [
  'dwarf',
  'giant',
  'horizontal-branch',
  'supergiant',
  'white-dwarf',
  'carbon',
];
/** Name of the row of a quasar file that holds the iron blend. */
const IRON = 'iron';

function read(label: string, bytes: Uint8Array): ReadSpectra {
  return readSpectra(readFits(bytesInMemory(label, bytes), DEFAULT_READ_LIMITS));
}

/** The stellar models of `stars.fits`. @throws InputFault when the bytes are not such a file */
export function starsFromFile(bytes: Uint8Array): StarGrid {
  const label = 'stars.fits';
  const file = read(label, bytes);
  if (Math.abs(file.grid.step / STORED_GRID.step - 1) > 1e-9) {
    throw new InputFault(
      'value-not-usable',
      { file: label },
      `step must be ${STORED_GRID.step}, got ${file.grid.step}`,
    );
  }
  const groups = file.text('group');
  const names = file.text('name');
  const temperatures = file.numbers('teff');
  const gravities = file.numbers('logg');
  const metallicities = file.numbers('metallicity');
  const scales = file.numbers('scale');
  return {
    grid: file.grid,
    models: file.rows.map((flux, k) => {
      const group = STAR_GROUPS.find((known) => known === groups[k]);
      if (!group) {
        throw new InputFault(
          'value-not-usable',
          { file: label, row: k },
          `group must be one of ${STAR_GROUPS.join(', ')}, got ${groups[k]!}`,
        );
      }
      return {
        name: names[k]!,
        group,
        temperature: temperatures[k]!,
        logGravity: gravities[k]!,
        metallicity: metallicities[k]!,
        scale: scales[k]!,
        flux,
      };
    }),
  };
}

/** Bytes of `populations.fits`. */
export function populationsToFile({ grid, populations }: PopulationSet): Uint8Array {
  return encodeSpectra({
    grid,
    rows: populations.map(({ flux }) => flux),
    columns: [
      { name: 'name', type: 'string', values: populations.map(({ name }) => name) },
      { name: 'age', type: 'float64', unit: 'Gyr', values: populations.map(({ age }) => age) },
      { name: 'metallicity', type: 'float64', values: populations.map(({ name }) => metallicityOf(name)) },
    ],
  });
}

function metallicityOf(name: string): number {
  return POPULATIONS.find((recipe) => recipe.name === name)?.metallicity ?? NaN;
}

/** The populations of `populations.fits`. @throws InputFault when the bytes are not such a file */
export function populationsFromFile(bytes: Uint8Array): PopulationSet {
  const file = read('populations.fits', bytes);
  const names = file.text('name');
  const ages = file.numbers('age');
  return {
    grid: file.grid,
    populations: file.rows.map((flux, k) => ({ name: names[k]!, age: ages[k]!, flux })),
  };
}

/** Bytes of `quasars.fits`. */
export function quasarsToFile({ iron, windows }: QuasarSet): Uint8Array {
  const rows = windows.flatMap(({ window, vectors }) => vectors.map((flux) => ({ window, flux })));
  return encodeSpectra({
    grid: QUASAR_SEARCH_GRID,
    rows: [iron, ...rows.map(({ flux }) => flux)],
    columns: [
      { name: 'name', type: 'string', values: [IRON, ...rows.map(() => 'search')] },
      { name: 'redshift_min', type: 'float64', values: [0, ...rows.map(({ window }) => window.from)] },
      { name: 'redshift_max', type: 'float64', values: [0, ...rows.map(({ window }) => window.to)] },
    ],
  });
}

/** What `quasars.fits` holds. @throws InputFault when the bytes are not such a file */
export function quasarsFromFile(bytes: Uint8Array): QuasarSet {
  const label = 'quasars.fits';
  const file = read(label, bytes);
  const fault = (detail: string): InputFault => new InputFault('value-not-usable', { file: label }, detail);
  const { length } = file.grid;
  if (length !== QUASAR_SEARCH_GRID.length) {
    throw fault(`spectra must have ${QUASAR_SEARCH_GRID.length} pixels, got ${length}`);
  }
  const names = file.text('name');
  const from = file.numbers('redshift_min');
  const to = file.numbers('redshift_max');
  const iron = file.rows[names.indexOf(IRON)];
  if (!iron) throw fault('one row must be named iron, got none');
  const starts = [...new Set(from.filter((_, k) => names[k] !== IRON))];
  return {
    iron,
    windows: starts.map((start) => {
      const members = from.flatMap((value, k) => (value === start && names[k] !== IRON ? [k] : []));
      return {
        window: { from: start, to: to[members[0]!]! },
        vectors: members.map((k) => file.rows[k]!),
      };
    }),
  };
}
