import { readFileSync } from 'node:fs';
import { resolve } from 'node:path';
import { parseTables, TABLE_FILES } from '../../../templates/physics/tables.ts';
import type { TableTexts } from '../../../templates/physics/tables.ts';

const DATA = resolve(import.meta.dirname, '../../../templates/data');

/** Texts of the tables the project bundles. */
export const BUNDLED_TEXTS = Object.fromEntries(
  Object.entries(TABLE_FILES).map(([key, file]) => [key, readFileSync(resolve(DATA, file), 'utf8')]),
) as TableTexts;

/** The same, parsed. */
export const BUNDLED_TABLES = parseTables(BUNDLED_TEXTS);
