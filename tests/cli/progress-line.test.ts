import { expect, it } from 'vitest';
import { durationText, progressLine, progressText } from '../../cli/progress-line.ts';

it('progressText() gives the rate and the time left', () => {
  expect(progressText('measure', 30, 120, 10)).toBe(
    'measure [######                  ] 30/120  3.0/s  30 s left',
  );
  expect(progressText('measure', 0, 120, 10)).toBe('measure [                        ] 0/120');
});

it('durationText() speaks in the two largest units', () => {
  expect([45, 200, 7_500].map(durationText)).toEqual(['45 s', '3 min 20 s', '2 h 5 min']);
});

it('progressLine() writes whole lines and no control characters where nobody watches', () => {
  let written = '';
  let now = 0;
  const line = progressLine('read', 2, { write: (text: string) => (written += text) }, () => now);
  line.update(1);
  now = 1_000;
  line.update(2);
  line.end();
  expect(written.split('\n')).toHaveLength(3);
  expect(written).not.toContain('\r');
});
