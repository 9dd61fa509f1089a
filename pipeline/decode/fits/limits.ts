/** Bounds that keep one bad file from taking a worker down. Each is an option with a reason. */
export interface ReadLimits {
  /** Header blocks of 2,880 bytes per HDU: the largest honest headers seen have about 100. */
  readonly headerBlocksPerHdu: number;
  readonly hdusPerFile: number;
  /** Pixels of one spectrum: an echelle order set has 5e5, a million is a mistake or another kind of data. */
  readonly pixelsPerSpectrum: number;
  readonly rowsPerFile: number;
  /** Bytes after decompression. */
  readonly decompressedBytes: number;
  /** Decompressed over compressed size: a FITS file never compresses a thousandfold. */
  readonly decompressionRatio: number;
  readonly textBytes: number;
}

export const DEFAULT_READ_LIMITS: ReadLimits = {
  headerBlocksPerHdu: 2_000,
  hdusPerFile: 20_000,
  pixelsPerSpectrum: 500_000,
  rowsPerFile: 200_000,
  decompressedBytes: 4e9,
  decompressionRatio: 1_000,
  textBytes: 200e6,
};
