import { readFileSync } from 'node:fs';

/** The version in package.json, which stands one folder above the sources and two above the compiled program. */
export function programVersion(): string {
  for (const place of ['../package.json', '../../package.json']) {
    try {
      const { name, version } = JSON.parse(readFileSync(new URL(place, import.meta.url), 'utf8')) as {
        name: string;
        version: string;
      };
      if (name === 'shiftwork') return version;
    } catch {
      // Not here: the next place, then the answer below.
    }
  }
  return 'unknown';
}
