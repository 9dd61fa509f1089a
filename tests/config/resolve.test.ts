import { expect, it } from 'vitest';
import { MEASURING_OPTIONS } from '../../config/measuring.ts';
import { OPERATING_OPTIONS } from '../../config/operating.ts';
import { OptionFault } from '../../config/option.ts';
import { resolveConfiguration } from '../../config/resolve.ts';

it('resolveConfiguration() lets the command line overrule the environment, that the file, and that the default', () => {
  const file = { text: 'threads: 3\nchunk: 5\nreviewConfidence: 0.8\n', label: 'config.yaml' };
  const environment = { SHIFTWORK_THREADS: '4', SHIFTWORK_CHUNK: '6' };
  const { operating, measuring, options } = resolveConfiguration({
    ...{ commandLine: { threads: '7' }, environment, file },
  });
  expect(operating).toMatchObject({ threads: 7, chunk: 6, workspace: './shiftwork' });
  expect(measuring.reviewConfidence).toBe(0.8);
  const origins = Object.fromEntries(options.map(({ name, origin }) => [name, origin]));
  expect(origins).toMatchObject({ threads: 'command line', chunk: 'environment', workspace: 'default' });
});

it.each([
  ['a number out of range', 'threads: 0'],
  ['a fraction where a whole number is due', 'threads: 1.5'],
  ['text where a number is due', 'threads: many'],
  ['an option that does not exist', 'thread: 2'],
  ['something that is not a list of options', '- threads'],
  ['what is not YAML', 'threads: ['],
])('resolveConfiguration() refuses %s', (_title, text) => {
  const sources = { commandLine: {}, environment: {}, file: { text, label: 'config.yaml' } };
  expect(() => resolveConfiguration(sources)).toThrow(OptionFault);
});

it('every option has a reason, and a default inside its range', () => {
  for (const [name, option] of Object.entries({ ...MEASURING_OPTIONS, ...OPERATING_OPTIONS })) {
    expect(option.why.length, name).toBeGreaterThan(20);
    if (option.range === null || option.default === null) continue;
    expect(option.default, name).toBeGreaterThanOrEqual(option.range[0]);
    expect(option.default, name).toBeLessThanOrEqual(option.range[1]);
  }
});
