import { InputFault } from '../../errors.ts';
import type { FaultPlace } from '../../errors.ts';

/** A text file in columns. */
export interface TextTable {
  readonly names: readonly string[];
  readonly units: readonly string[];
  /** One array per column; what is no number is NaN. */
  readonly columns: readonly Float64Array[];
  /** Comment lines without their mark. */
  readonly comments: readonly string[];
  /** `key: value` and `key = value` pairs found in comments. */
  readonly cards: readonly (readonly [string, string])[];
}

const COMMENT = /^\s*(#|;|!|%|\/\/|\\|\|)/;
const MISSING = /^(nan|null|none|n\/a|-|--|inf|[-+]inf|"")?$/i;

/**
 * Parse a table of numbers: separated by white space, commas, semicolons or tabs; with or without a header line,
 * with comment lines, or ECSV with names and units in its comment header.
 *
 * @param text the whole file
 * @param place for messages
 * @throws InputFault `text-malformed` when lines differ in their number of columns or hold words among numbers;
 * `file-empty` without a data line
 */
export function parseText(text: string, place: FaultPlace): TextTable {
  const comments: string[] = [];
  const lines: { readonly number: number; readonly cells: readonly string[] }[] = [];
  let separator: RegExp | null = null;
  text.split(/\r\n|\r|\n/).forEach((line, index) => {
    if (line.trim() === '') return;
    if (COMMENT.test(line)) {
      comments.push(line.replace(/^\s*(#|;|!|%|\/\/|\\|\|)+\s?/, '').trimEnd());
      return;
    }
    separator ??= separatorOf(line);
    lines.push({
      number: index + 1,
      cells: line
        .trim()
        .split(separator)
        .map((cell) => cell.trim()),
    });
  });
  const firstLine = lines[0];
  if (firstLine === undefined)
    throw new InputFault('file-empty', place, 'the text must hold numbers, got none');
  const hasHeader = firstLine.cells.some((cell) => !isNumberOrMissing(cell));
  const dataLines = hasHeader ? lines.slice(1) : lines;
  const width = (dataLines[0] ?? firstLine).cells.length;
  const columns = Array.from({ length: width }, () => new Float64Array(dataLines.length));
  dataLines.forEach(({ number, cells }, row) => {
    if (cells.length !== width) {
      const detail = `line ${number} must have ${width} columns, got ${cells.length}`;
      throw new InputFault('text-malformed', place, detail);
    }
    cells.forEach((cell, column) => {
      if (!isNumberOrMissing(cell)) {
        const detail = `line ${number} column ${column + 1} must be a number, got '${cell.slice(0, 40)}'`;
        throw new InputFault('text-malformed', place, detail);
      }
      columns[column]![row] = MISSING.test(cell) ? NaN : Number(fortranToE(cell));
    });
  });
  return {
    ...namesAndUnits(comments, hasHeader ? firstLine.cells : null, width),
    columns,
    comments,
    cards: cardsIn(comments),
  };
}

function separatorOf(line: string): RegExp {
  if (line.includes(',')) return /\s*,\s*/;
  if (line.includes(';')) return /\s*;\s*/;
  return /\s+/;
}

function isNumberOrMissing(cell: string): boolean {
  return MISSING.test(cell) || (cell !== '' && Number.isFinite(Number(fortranToE(cell))));
}

/** `1.5D+03` is how older programs write doubles. */
function fortranToE(cell: string): string {
  return cell.replace(/^([-+\d.]+)[dD]([-+]?\d+)$/, '$1e$2');
}

/** From an ECSV header, else the header line (`flux [erg/s]`), else a last comment with as many words as columns. */
function namesAndUnits(
  comments: readonly string[],
  header: readonly string[] | null,
  width: number,
): { names: string[]; units: string[] } {
  const described = comments
    .map((comment) => /^\s*-\s*\{\s*name:\s*([^,}]+)(.*)\}/.exec(comment))
    .filter((found) => found !== null);
  if (described.length === width) {
    const unit = (rest: string): string => /unit:\s*([^,}]+)/.exec(rest)?.[1]?.trim() ?? '';
    return {
      names: described.map((found) => bare(found[1]!)),
      units: described.map((found) => bare(unit(found[2]!))),
    };
  }
  const last = comments[comments.length - 1]?.trim().split(/[\s,;]+/) ?? [];
  const words =
    header ?? (last.length === width && last.every((word) => /[A-Za-z]/.test(word)) ? last : null);
  const names = Array.from({ length: width }, (_, i) => words?.[i] ?? '');
  return {
    names: names.map((name) => bare(name.replace(/[[(].*$/, ''))),
    units: names.map((name) => /[[(]([^\])]*)[\])]/.exec(name)?.[1]?.trim() ?? ''),
  };
}

function bare(text: string): string {
  return text.trim().replace(/^(['"])(.*)\1$/, '$2');
}

function cardsIn(comments: readonly string[]): (readonly [string, string])[] {
  return comments.flatMap((comment) => {
    const found = /^\s*([A-Za-z][\w .-]{0,40}?)\s*[:=]\s*(\S.*?)\s*$/.exec(comment);
    return found === null ? [] : [[found[1]!, found[2]!] as const];
  });
}
