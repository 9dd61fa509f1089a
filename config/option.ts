/** What a person needs to know about one option before changing it. */
export interface OptionDescription<T> {
  /** Unit of the value in plain words; empty for a pure number, a name or a switch. */
  readonly unit: string;
  /** Smallest and largest allowed value; null for options that are not numbers. */
  readonly range: readonly [number, number] | null;
  /** Whether the number must be whole. */
  readonly whole?: boolean;
  readonly default: T;
  /** What it does and why the default is what it is. */
  readonly why: string;
}

/** A value an option can take. `null` means: not set, the program decides as `why` says. */
export type OptionValue = number | string | boolean | null;

/** An option that was given a value it cannot take. Wrong usage, never a bug. */
export class OptionFault extends Error {
  override readonly name = 'OptionFault';
}

/**
 * Turns what a person wrote (text from the command line or the environment, a YAML scalar from a file) into
 * the value of an option.
 *
 * @param name what messages call the option
 * @param description tells the type by its default and, when that is null, by its range
 * @param given the value as written; the word `none` means null where null is the default
 * @returns the value, inside its range
 * @throws OptionFault when it is of another type or out of range
 */
export function readOption<T extends OptionValue>(
  name: string,
  description: OptionDescription<T>,
  given: unknown,
): T {
  const fallback: OptionValue = description.default;
  if (fallback === null && (given === null || given === 'none')) return description.default;
  if (description.range !== null) return readNumber(name, description, given) as T;
  if (typeof fallback === 'boolean') return readSwitch(name, given) as T;
  if (typeof given !== 'string' || given === '') {
    throw new OptionFault(`${name} must be a non-empty text, got ${JSON.stringify(given)}`);
  }
  return given as T;
}

function readNumber(name: string, description: OptionDescription<OptionValue>, given: unknown): number {
  const value = typeof given === 'string' && given.trim() !== '' ? Number(given) : given;
  const [low, high] = description.range!;
  const unit = description.unit === '' ? '' : ` ${description.unit}`;
  const kind = description.whole === true ? 'a whole number' : 'a number';
  if (
    typeof value !== 'number' ||
    !(value >= low && value <= high) ||
    (description.whole === true && !Number.isInteger(value))
  ) {
    throw new OptionFault(
      `${name} must be ${kind} from ${low} to ${high}${unit}, got ${JSON.stringify(given)}`,
    );
  }
  return value;
}

function readSwitch(name: string, given: unknown): boolean {
  if (given === true || given === 'true') return true;
  if (given === false || given === 'false') return false;
  throw new OptionFault(`${name} must be true or false, got ${JSON.stringify(given)}`);
}
