import { chart, chartX, chartY, countCeiling, countTicks, legend, round } from './chart.ts';
import type { Frame, Tick } from './chart.ts';
import { html } from './html.ts';
import type { Markup } from './html.ts';

export interface BarLayer {
  /** CSS class that gives the colour. */
  readonly tone: string;
  readonly label: string;
  /** One count per bin; all layers have the same number of bins. */
  readonly counts: readonly number[];
}

/**
 * A chart of counts in equal bins, layers stacked from the axis up.
 *
 * @param layers at least one
 */
export function stackedBars(parts: {
  readonly frame: Frame;
  readonly title: string;
  readonly description: string;
  readonly xTitle: string;
  readonly yTitle: string;
  readonly xTicks: readonly Tick[];
  readonly layers: readonly BarLayer[];
}): Markup {
  const bins = parts.layers[0]!.counts.length;
  const totals = Array.from({ length: bins }, (_, bin) =>
    parts.layers.reduce((sum, layer) => sum + layer.counts[bin]!, 0),
  );
  const ceiling = countCeiling(Math.max(0, ...totals));
  // A hairline between bars, but never at the cost of the bar itself.
  const gap = Math.min(0.15 / bins, 0.002);
  const bars = totals.map((_, bin) => {
    const left = chartX(parts.frame, bin / bins + gap);
    const width = round(chartX(parts.frame, (bin + 1) / bins - gap) - left);
    let below = 0;
    return parts.layers.map((layer) => {
      const count = layer.counts[bin]!;
      if (count === 0) return null;
      const y = chartY(parts.frame, (below + count) / ceiling);
      const height = round(chartY(parts.frame, below / ceiling) - y);
      below += count;
      return html`<rect class="${layer.tone}" x="${left}" y="${y}" width="${width}" height="${height}"/>`;
    });
  });
  return chart({
    ...parts,
    yTicks: countTicks(ceiling),
    marks: html`${bars}`,
    ...(parts.layers.length > 1 ? { legend: legend(parts.layers) } : {}),
  });
}
