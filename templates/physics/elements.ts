import { numberColumn, parseCsv, textColumn } from './csv-columns.ts';

/** What the physics needs to know of one chemical element. */
export interface Element {
  /** Atomic number, 1 = hydrogen. */
  readonly number: number;
  readonly symbol: string;
  /** Standard atomic weight, u. */
  readonly weight: number;
  /** Number of atoms per hydrogen atom in the solar photosphere. */
  readonly solarAbundance: number;
  /** First, second and third ionisation energy, eV; NaN where there is none. */
  readonly ionisationEv: readonly [number, number, number];
}

/**
 * Elements by atomic number, from the text of templates/data/elements.csv.
 * @throws RangeError when a column is missing or hydrogen is absent.
 */
export function parseElements(text: string): ReadonlyMap<number, Element> {
  const table = parseCsv(text);
  const numbers = numberColumn(table, 'number');
  const symbols = textColumn(table, 'symbol');
  const weights = numberColumn(table, 'weight');
  const logAbundances = numberColumn(table, 'abundance');
  const energies = ['ionisation1', 'ionisation2', 'ionisation3'].map((name) => numberColumn(table, name));
  const elements = new Map<number, Element>();
  for (let row = 0; row < numbers.length; row += 1) {
    elements.set(numbers[row]!, {
      number: numbers[row]!,
      symbol: symbols[row]!,
      weight: weights[row]!,
      solarAbundance: 10 ** (logAbundances[row]! - 12),
      ionisationEv: [energies[0]![row]!, energies[1]![row]!, energies[2]![row]!],
    });
  }
  if (!elements.has(1)) {
    throw new RangeError('elements must include hydrogen');
  }
  return elements;
}
