/** Files of a night that are handed out, and their media types; no other file of its folder is. */
export const DOWNLOADS: Readonly<Record<string, string>> = {
  'catalogue.csv': 'text/csv; charset=utf-8',
  // RFC 4047.
  'catalogue.fits': 'application/fits',
  'catalogue.parquet': 'application/vnd.apache.parquet',
  // The VOTable standard of the IVOA, from memory.
  'catalogue.vot': 'application/x-votable+xml',
  'run.json': 'application/json; charset=utf-8',
};

/** The page of a night. */
export const REPORT_FILE = 'report.html';
