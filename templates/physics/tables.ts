import type { AtmosphereTables } from './atmosphere.ts';
import { parseElements } from './elements.ts';
import type { AbsorberTables } from './line-absorbers.ts';
import { parseAtomicLines, parseHeliumLines, toLineList } from './line-list.ts';
import type { Line, LineList } from './line-list.ts';
import { generateBandLines, parseBandSystems } from './molecular-bands.ts';
import { parseMolecularStates } from './molecular-states.ts';
import { parseMoleculeEquilibrium } from './molecule-equilibrium.ts';
import { parsePartitionFunctions } from './partition-functions.ts';
import { parseAtomicEdges } from './photo-ionisation.ts';

/** Names of the bundled tables, files of templates/data. */
export const TABLE_FILES = {
  elements: 'elements.csv',
  partitions: 'partition-functions.csv',
  equilibrium: 'molecule-equilibrium.csv',
  edges: 'photo-ionisation.csv',
  states: 'molecular-states.csv',
  bands: 'band-systems.csv',
  helium: 'helium-lines.csv',
} as const;

/** Text of every bundled table. */
export type TableTexts = Readonly<Record<keyof typeof TABLE_FILES, string>>;

/** Every table that the physics of a star needs, but its lines. */
export type PhysicsTables = AtmosphereTables & AbsorberTables;

/** Parses the bundled tables. @throws RangeError when one is malformed. */
export function parseTables(texts: TableTexts): PhysicsTables {
  return {
    elements: parseElements(texts.elements),
    partitions: parsePartitionFunctions(texts.partitions),
    equilibrium: parseMoleculeEquilibrium(texts.equilibrium),
    atomicEdges: parseAtomicEdges(texts.edges),
    molecularStates: parseMolecularStates(texts.states),
  };
}

/** The lines of a star. */
export interface StarLines {
  readonly atoms: LineList;
  readonly molecules: LineList;
}

/**
 * All lines: atomic ones from a list (see parseAtomicLines), helium and molecular bands from bundled tables.
 * @throws RangeError when a table is malformed.
 */
export function assembleLines(atomicLineText: string, texts: TableTexts): StarLines {
  const atoms: Line[] = [
    ...parseAtomicLines(atomicLineText, parseElements(texts.elements)),
    ...parseHeliumLines(texts.helium),
  ];
  return {
    atoms: toLineList(atoms),
    molecules: toLineList(generateBandLines(parseBandSystems(texts.bands))),
  };
}
