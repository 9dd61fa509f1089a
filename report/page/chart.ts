import { html } from './html.ts';
import type { Markup } from './html.ts';
import { whole } from './numbers.ts';
import { ticks } from './ticks.ts';

/** Drawing area in SVG units; the page scales it to its column. */
export const CHART = { width: 560, height: 250, left: 52, right: 12, top: 14, bottom: 44 } as const;

export interface Tick {
  /** 0..1 along the axis. */
  readonly at: number;
  readonly label: string;
}

/** Pixel column of a share 0..1 of the x axis. */
export function chartX(share: number): number {
  return round(CHART.left + share * (CHART.width - CHART.left - CHART.right));
}

/** Pixel row of a share 0..1 of the y axis, 0 at the bottom. */
export function chartY(share: number): number {
  return round(CHART.height - CHART.bottom - share * (CHART.height - CHART.top - CHART.bottom));
}

/** Two decimals are below what a printer resolves at this size. */
export function round(value: number): number {
  return Math.round(value * 100) / 100;
}

/** Upper end of a count axis: at least 1, a little air above the highest bar. */
export function countCeiling(highest: number): number {
  return Math.max(1, highest * 1.08);
}

/** Tick marks of a count axis from 0 to `ceiling`, whole numbers only. */
export function countTicks(ceiling: number): readonly Tick[] {
  return ticks(0, ceiling, 4)
    .filter((value) => Number.isInteger(value))
    .map((value) => ({ at: value / ceiling, label: whole(value) }));
}

/**
 * A framed chart with both axes named.
 *
 * @param description what the chart says, in a sentence, for those who do not see it
 */
export function chart(parts: {
  readonly title: string;
  readonly description: string;
  readonly xTitle: string;
  readonly yTitle: string;
  readonly xTicks: readonly Tick[];
  readonly yTicks: readonly Tick[];
  readonly marks: Markup;
  readonly legend?: Markup;
}): Markup {
  const { width, height, left, right, top, bottom } = CHART;
  const middleX = (left + width - right) / 2;
  const middleY = (top + height - bottom) / 2;
  return html`<figure class="chart">
<figcaption>${parts.title}</figcaption>${parts.legend ?? null}
<svg viewBox="0 0 ${width} ${height}" role="img" aria-label="${parts.description}">
${parts.yTicks.map(
  (
    tick,
  ) => html`<line class="grid" x1="${left}" x2="${width - right}" y1="${chartY(tick.at)}" y2="${chartY(tick.at)}"/>
<text class="tick" x="${left - 7}" y="${chartY(tick.at) + 4}" text-anchor="end">${tick.label}</text>`,
)}
${parts.marks}
<line class="axis" x1="${left}" x2="${width - right}" y1="${chartY(0)}" y2="${chartY(0)}"/>
${parts.xTicks.map(
  (
    tick,
  ) => html`<line class="axis" x1="${chartX(tick.at)}" x2="${chartX(tick.at)}" y1="${chartY(0)}" y2="${chartY(0) + 4}"/>
<text class="tick" x="${chartX(tick.at)}" y="${chartY(0) + 17}" text-anchor="middle">${tick.label}</text>`,
)}
<text class="axis-title" x="${middleX}" y="${height - 6}" text-anchor="middle">${parts.xTitle}</text>
<text class="axis-title" transform="translate(12 ${middleY}) rotate(-90)" text-anchor="middle">${parts.yTitle}</text>
</svg></figure>`;
}

/** A swatch and a word for each colour used. */
export function legend(entries: readonly { readonly tone: string; readonly label: string }[]): Markup {
  return html`<ul class="legend">${entries.map(
    (entry) =>
      html`<li><svg class="swatch" viewBox="0 0 10 10" aria-hidden="true"><rect class="${entry.tone}" width="10" height="10"/></svg>${entry.label}</li>`,
  )}</ul>`;
}
