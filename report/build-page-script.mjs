import { fileURLToPath } from 'node:url';
import { build } from 'vite';

/**
 * Bundles the script of the static report, uPlot included, into one plain script that can stand inside a page.
 *
 * @param {string} outDir where `page-script.js` goes
 */
export async function buildPageScript(outDir) {
  await build({
    configFile: false,
    publicDir: false,
    logLevel: 'error',
    build: {
      outDir,
      emptyOutDir: false,
      target: 'es2022',
      lib: {
        entry: fileURLToPath(new URL('./client/main.ts', import.meta.url)),
        name: 'nightReport',
        formats: ['iife'],
        fileName: () => 'page-script.js',
      },
    },
  });
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  await buildPageScript(fileURLToPath(new URL('../dist/report/client/', import.meta.url)));
}
