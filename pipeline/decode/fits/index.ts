export { DEFAULT_READ_LIMITS } from './limits.ts';
export type { ReadLimits } from './limits.ts';
export type {
  CardValue,
  FitsFile,
  Hdu,
  Header,
  ImageHdu,
  Numbers,
  OtherHdu,
  TableColumn,
  TableHdu,
} from './model.ts';
export { readFits } from './read-fits.ts';
