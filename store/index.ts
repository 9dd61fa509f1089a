export { byCodeUnit } from './by-code-unit.ts';
export type { CatalogueRow } from './catalogue-row.ts';
export type * from './contract.ts';
export { packCurves, unpackCurves } from './curve-codec.ts';
export { asEnvironmentFault, EnvironmentFault } from './environment-fault.ts';
export type { NightFacts, NightReader, SpectrumDetail } from './night-reader.ts';
export { openSqliteStore } from './open-sqlite.ts';
export { nightReader } from './read-night.ts';
