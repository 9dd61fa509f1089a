export { asciiText } from './ascii.ts';
export { encodeFits, encodeFitsChunks } from './encode-fits.ts';
export type { CardSpec, ColumnSpec, HduSpec, ImageSpec, Pixels, TableSpec } from './hdu-spec.ts';
