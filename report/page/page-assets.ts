import { readFile } from 'node:fs/promises';
import { createRequire } from 'node:module';

/** What is inlined into the page besides its own style sheet. */
export interface PageAssets {
  /** One plain script without imports. */
  readonly script: string;
  /** Style sheet of the plot library. */
  readonly plotStyle: string;
}

/** In the built program the script lies beside this folder; run from source it is where the build leaves it. */
const SCRIPT_PLACE = import.meta.url.endsWith('.ts')
  ? '../../dist/report/client/page-script.js'
  : '../client/page-script.js';

/**
 * Reads the script of the page and the style of the plot library.
 *
 * @throws Error when the script has not been built
 */
export async function pageAssets(): Promise<PageAssets> {
  const script = new URL(SCRIPT_PLACE, import.meta.url);
  const plotStyle = createRequire(import.meta.url).resolve('uplot/dist/uPlot.min.css');
  try {
    return { script: await readFile(script, 'utf8'), plotStyle: await readFile(plotStyle, 'utf8') };
  } catch (cause) {
    throw new Error(`the script of the report must be at ${script.pathname}: run \`npm run build\``, {
      cause,
    });
  }
}
