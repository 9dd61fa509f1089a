import { expect, it } from 'vitest';
import type { Layout } from '../../pipeline/decode/index.ts';
import { expectedSpectra, fileNames } from '../../worker/spectrum-id.ts';

const layout = (form: Layout['form'], rowCount: number): Layout => ({
  form,
  arms: [{ flux: { hdu: 3, column: null, imageRow: null } } as Layout['arms'][number]],
  ...{ targetsHdu: null, rowCount, frame: 'unknown', recognised: [], missing: [] },
});

it('fileNames() drops suffixes where a file stays unlike every other, and keeps them where it would not', () => {
  expect(fileNames(['b/one.fits.gz', 'two.txt', 'two.fits', 'v1.5/x.fits'])).toEqual([
    ...['b/one', 'two.txt', 'two.fits', 'v1.5/x'],
  ]);
});

it('fileNames() never gives a name twice, even for equal paths under two roots', () => {
  const names = fileNames(['a.fits', 'a.fits', 'a'], new Set(['a']));
  expect(new Set(names).size).toBe(3);
  expect(names).not.toContain('a');
});

it('expectedSpectra() names a stacked row by HDU and row, a lone spectrum by its HDU, a broken file by its name', () => {
  const ids = (form: Layout['form'], rows: number) =>
    expectedSpectra('n', 'f', 'id', layout(form, rows), []).map(({ spectrumId }) => spectrumId);
  expect(ids('row-stack', 2)).toEqual(['n/f#3.0', 'n/f#3.1']);
  expect(ids('image-one-spectrum', 1)).toEqual(['n/f#3']);
  expect(expectedSpectra('n', 'f', 'id', null, []).map(({ spectrumId }) => spectrumId)).toEqual(['n/f']);
});
