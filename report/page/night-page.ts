import { createHash } from 'node:crypto';
import type { NightReader } from '../../store/night-reader.ts';
import { inCatalogueOrder } from '../catalogue/row-order.ts';
import { summarise } from '../night/summary.ts';
import { flaggedSection } from './flagged-section.ts';
import type { PlotLimits } from './flagged-section.ts';
import { glance } from './glance.ts';
import { howMeasured } from './how-measured.ts';
import { html, trusted } from './html.ts';
import type { PageAssets } from './page-assets.ts';
import {
  confidenceChart,
  fibreChart,
  reasonTable,
  redshiftChart,
  successChart,
  velocityChart,
} from './night-charts.ts';
import { STYLE } from './style.ts';

/** A thousand plots are more than anyone looks at in a morning; 25 MB opens from disk without a wait. */
export const PLOT_LIMITS: PlotLimits = { plots: 1_000, bytes: 25_000_000 };

/**
 * The report of a night as one HTML page that needs neither a server nor a network: its policy allows exactly the
 * one script and the two style sheets inside it, by their hashes.
 */
export function nightPage(reader: NightReader, assets: PageAssets, limits: PlotLimits = PLOT_LIMITS): string {
  const facts = reader.facts();
  const rows = inCatalogueOrder(reader.rows());
  const summary = summarise(facts, rows);
  const { cards, curves } = flaggedSection(reader, rows, limits);
  // An end tag inside the script would end it early; a backslash before the slash means the same to JavaScript.
  const script = assets.script.replaceAll('</script', '<\\/script');
  const policy = [
    "default-src 'none'",
    `script-src '${sourceHash(script)}'`,
    `style-src '${sourceHash(STYLE)}' '${sourceHash(assets.plotStyle)}'`,
    "base-uri 'none'",
    "form-action 'none'",
  ].join('; ');
  return html`<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta http-equiv="Content-Security-Policy" content="${policy}">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>${facts.name} · Shiftwork</title>
<style>${trusted(STYLE)}</style>
<style>${trusted(assets.plotStyle)}</style>
</head>
<body>
<main>
${glance(facts, summary)}
<section aria-labelledby="h-objects"><h2 id="h-objects">What was found, and how sure it is</h2>
<div class="pair">${confidenceChart(summary)}${successChart(summary)}${redshiftChart(summary)}${velocityChart(summary)}</div></section>
<section aria-labelledby="h-wrong"><h2 id="h-wrong">What went wrong, and where</h2>
${reasonTable(summary)}<div class="wide">${fibreChart(summary)}</div></section>
${cards}
${howMeasured(facts)}
</main>
${curves}
<script>${trusted(script)}</script>
</body>
</html>
`.text;
}

/** Hash source of a Content Security Policy (W3C CSP Level 3, 2.3.1). */
function sourceHash(text: string): string {
  return `sha256-${createHash('sha256').update(text).digest('base64')}`;
}
