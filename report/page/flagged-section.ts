import type { CatalogueRow } from '../../store/catalogue-row.ts';
import type { NightReader } from '../../store/night-reader.ts';
import { outcomeOf } from '../night/outcome.ts';
import { packSpectrum } from '../spectrum/pack.ts';
import { flaggedCard } from './flagged-card.ts';
import type { PlotState } from './flagged-card.ts';
import { html, jsonBlock } from './html.ts';
import type { Markup } from './html.ts';
import { counted, whole } from './numbers.ts';

export interface PlotLimits {
  /** Most spectra whose plots are embedded. */
  readonly plots: number;
  /** Most bytes of embedded curves. */
  readonly bytes: number;
}

/**
 * The list of spectra a person should look at, and their curves as data blocks.
 *
 * @returns `cards` for where the list stands, `curves` for the end of the page, so that the text is there first
 */
export function flaggedSection(
  reader: NightReader,
  rows: readonly CatalogueRow[],
  limits: PlotLimits,
): { readonly cards: Markup; readonly curves: Markup } {
  const flagged = mostPromisingFirst(rows);
  if (flagged.length === 0) {
    return {
      cards: html`<section aria-labelledby="h-flagged"><h2 id="h-flagged">Spectra to look at</h2><p>None: every spectrum of the night could be accepted.</p></section>`,
      curves: html``,
    };
  }
  const cards: Markup[] = [];
  const curves: Markup[] = [];
  let bytes = 0;
  let leftOut = 0;
  flagged.forEach((row, index) => {
    const detail = reader.detail(row.spectrum_id);
    const payload = packSpectrum(row, detail);
    let plot: PlotState = 'not-kept';
    if (payload !== null) {
      const block = jsonBlock(payload);
      plot =
        curves.length < limits.plots && bytes + block.text.length <= limits.bytes ? 'embedded' : 'left-out';
      if (plot === 'embedded') {
        bytes += block.text.length;
        curves.push(html`<script type="application/json" id="curves-${index}">${block}</script>`);
      } else leftOut++;
    }
    cards.push(flaggedCard(row, detail, index, plot));
  });
  const omitted =
    leftOut === 0
      ? ''
      : ` The plots of ${counted(leftOut, 'spectrum', 'spectra')} are left out to keep this file small; their facts are here.`;
  return {
    cards: html`<section aria-labelledby="h-flagged"><h2 id="h-flagged">Spectra to look at</h2>
<p>${counted(flagged.length, 'spectrum', 'spectra')}, the surest first, unreadable ones last.${omitted}</p>
<div id="controls" data-total="${whole(flagged.length)}"></div>
<noscript><p class="note">Plots, sorting and filters need the script of this page; everything else is here.</p></noscript>
<div id="cards">${cards}</div></section>`,
    curves: html`${curves}`,
  };
}

/** Flagged rows by falling confidence; then those without; unreadable ones, where there is nothing to see, last. */
function mostPromisingFirst(rows: readonly CatalogueRow[]): readonly CatalogueRow[] {
  const rank = (row: CatalogueRow): number => (outcomeOf(row) === 'unreadable' ? -2 : (row.confidence ?? -1));
  return rows
    .filter((row) => outcomeOf(row) === 'flagged' || outcomeOf(row) === 'unreadable')
    .toSorted((a, b) => rank(b) - rank(a) || (a.spectrum_id < b.spectrum_id ? -1 : 1));
}
