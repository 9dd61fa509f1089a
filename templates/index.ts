export { buildPopulations, buildQuasars } from './derived-files.ts';
export type { Component, ComponentRole, Family, Kind, LogGrid } from './family.ts';
export { KINDS } from './family.ts';
export type { FamilyFiles, FamilyLibrary } from './library.ts';
export { loadFamilyLibrary, PREPARATION_VERSION } from './library.ts';
export type { FamilyFileName, FileRecord, Manifest } from './manifest.ts';
export { FAMILY_FILE_NAMES, manifestDisagreements, manifestOf } from './manifest.ts';
