import { expect, it } from 'vitest';
import { chunkSize, planChunks } from '../../worker/chunk-plan.ts';

const pending = (inputId: string, ordinals: readonly number[], exposureKey: string | null) =>
  ordinals.map((ordinal) => ({
    ...{ spectrumId: `n/${inputId}#1.${ordinal}`, inputId, ordinal, hdu: 1, row: ordinal, exposureKey },
  }));

it('planChunks() covers every pending spectrum once, never over the border of an exposure', () => {
  const all = [...pending('a', [0, 1, 2, 5, 6], 'x'), ...pending('b', [0, 1, 2], 'y')];
  const chunks = planChunks(all, 4);
  expect(chunks).toEqual([
    {
      exposureKey: 'x',
      ranges: [
        { inputId: 'a', first: 0, count: 3 },
        { inputId: 'a', first: 5, count: 1 },
      ],
    },
    { exposureKey: 'x', ranges: [{ inputId: 'a', first: 6, count: 1 }] },
    { exposureKey: 'y', ranges: [{ inputId: 'b', first: 0, count: 3 }] },
  ]);
});

it('planChunks() puts single-spectrum files together in one chunk', () => {
  const chunks = planChunks([...pending('a', [0], null), ...pending('b', [0], null)], 10);
  expect(chunks).toHaveLength(1);
  expect(chunks[0]!.ranges).toHaveLength(2);
});

it('chunkSize() aims at five seconds, gives each thread several chunks and never leaves 1..240', () => {
  expect(chunkSize(100_000, 2, 100)).toBe(50);
  expect(chunkSize(100_000, 2, 0.01)).toBe(240);
  expect(chunkSize(16, 2, 1)).toBe(2);
  expect(chunkSize(1, 8, 60_000)).toBe(1);
});
