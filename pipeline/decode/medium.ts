import type { Header } from './fits/model.ts';

/** Whether wavelengths are those of light in vacuum or in air, and what says so. */
export interface MediumReading {
  readonly medium: 'vacuum' | 'air';
  readonly because: string;
}

/**
 * The medium that headers or names state: a logical card whose keyword begins with VAC or AIR, a text card about
 * wavelengths, a name or unit with `air` or `vac` in it, or a comment about wavelengths.
 *
 * @param headers of the flux HDU and the primary HDU, nearest first
 * @param names names and units of the wavelength array
 * @returns null when nothing says
 */
export function statedMedium(headers: readonly Header[], names: readonly string[]): MediumReading | null {
  for (const name of names) {
    const medium = mediumOfWords(name);
    if (medium !== null) return { medium, because: `the name '${name}'` };
  }
  for (const header of headers) {
    for (const key of header.keys()) {
      const medium = mediumOfCard(key, header.get(key));
      if (medium !== null) return { medium, because: `the card ${key}` };
    }
    for (const comment of header.comments) {
      if (!/wavelength|lambda/i.test(comment)) continue;
      const medium = mediumOfWords(comment);
      if (medium !== null) return { medium, because: `the comment '${comment.trim()}'` };
    }
  }
  return null;
}

function mediumOfCard(key: string, value: unknown): 'vacuum' | 'air' | null {
  if (typeof value === 'boolean') {
    if (/^VAC/.test(key)) return value ? 'vacuum' : 'air';
    if (/^AIR(_?(WAV|LAM)|$)/.test(key)) return value ? 'air' : 'vacuum';
  }
  if (typeof value === 'string' && /WAV|LAMBDA|MEDIUM|AIRVAC|VACAIR/.test(key)) return mediumOfWords(value);
  return null;
}

/** `air` and `vac` as words of their own; both or none tell nothing. */
function mediumOfWords(text: string): 'vacuum' | 'air' | null {
  const plain = text.toLowerCase().replace(/_/g, ' ');
  const vacuum = /\bvac(uum)?\b|\bvac(wave|lam)/.test(plain);
  const air = /\bair\b|\bair(wave|lam)/.test(plain);
  return vacuum === air ? null : vacuum ? 'vacuum' : 'air';
}
