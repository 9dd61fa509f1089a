import { execFileSync } from 'node:child_process';
import { expect, it } from 'vitest';
import { DEFAULT_MEASURING_OPTIONS } from '../../config/measuring.ts';
import { canonicalJson, recipeHash, recipeOf } from '../../worker/recipe.ts';
import { PYTHON } from '../support/outside-tool.ts';

const recipe = recipeOf(DEFAULT_MEASURING_OPTIONS, null, 'f'.repeat(64));

it('recipeHash() is the sha256 that Python gives for the same sorted, space-free JSON', () => {
  const program =
    'import hashlib,json,sys; v=json.load(sys.stdin); ' +
    'print(hashlib.sha256(json.dumps(v,sort_keys=True,separators=(",",":")).encode()).hexdigest())';
  // Integers and short decimals only: the two languages write those alike.
  const plain = { ...recipe, measuring: { ...recipe.measuring, gridStepLn: 0.25 } };
  const expected = execFileSync(PYTHON, ['-c', program], { input: JSON.stringify(plain), encoding: 'utf8' });
  expect(recipeHash(plain)).toBe(expected.trim());
});

it('recipeHash() changes with an option, the profile and the families', () => {
  const hashes = [
    recipe,
    recipeOf({ ...DEFAULT_MEASURING_OPTIONS, reviewConfidence: 0.8 }, null, recipe.families),
    recipeOf(DEFAULT_MEASURING_OPTIONS, { name: 'x' }, recipe.families),
    recipeOf(DEFAULT_MEASURING_OPTIONS, null, '0'.repeat(64)),
  ].map(recipeHash);
  expect(new Set(hashes).size).toBe(4);
});

it('canonicalJson() gives one text whatever the order of keys', () => {
  expect(canonicalJson({ b: 1, a: [{ d: null, c: 'x' }] })).toBe('{"a":[{"c":"x","d":null}],"b":1}');
});
