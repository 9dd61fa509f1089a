/**
 * `npm run check:dependencies`: who may import whom (.dependency-cruiser.cjs).
 * A cruise that saw fewer modules than there are source files fails too: with a compiler it does not know,
 * the tool reports success over nothing.
 */
import { extname } from 'node:path';
import { cruise } from 'dependency-cruiser';
import extractOptions from 'dependency-cruiser/config-utl/extract-depcruise-options';
import extractTypeScriptConfig from 'dependency-cruiser/config-utl/extract-ts-config';
import { filesUnder, SOURCE_FOLDERS } from './source-hash.mjs';

const TESTING_FOLDERS = ['tests', 'bench'];

const root = process.cwd();
const sources = [...SOURCE_FOLDERS, ...TESTING_FOLDERS]
  .flatMap((folder) => filesUnder(root, folder))
  .filter((name) => extname(name) === '.ts');
const options = await extractOptions('./.dependency-cruiser.cjs');
const { output } = await cruise(sources, options, undefined, {
  tsConfig: extractTypeScriptConfig('./tsconfig.json'),
});

const cruised = new Set(output.modules.map((module) => module.source));
const missed = sources.filter((name) => !cruised.has(name));
for (const name of missed) console.error(`not looked at: ${name}`);
for (const { rule, from, to } of output.summary.violations) {
  const reason = options.ruleSet.forbidden.find(({ name }) => name === rule.name)?.comment ?? '';
  console.error(`${rule.name}: ${from}${from === to ? '' : ` -> ${to}`}\n  ${reason}`);
}
const failed = missed.length > 0 || output.summary.violations.length > 0 || sources.length === 0;
console.log(
  `dependencies: ${sources.length} modules looked at, ${output.summary.violations.length} violations`,
);
process.exit(failed ? 1 : 0);
