import { html } from './html.ts';
import type { Markup } from './html.ts';
import { whole } from './numbers.ts';
import { ticks } from './ticks.ts';

/** A drawing area in SVG units; the page scales it to the width of its column. */
export interface Frame {
  readonly width: number;
  readonly height: number;
}

/** For charts that stand in pairs, and for one that has the whole width. */
export const HALF_WIDTH: Frame = { width: 560, height: 250 };
export const FULL_WIDTH: Frame = { width: 1160, height: 220 };

/** Room for the axes: tick labels and titles inside the drawing area. */
const EDGE = { left: 66, right: 24, top: 14, bottom: 44 } as const;

export interface Tick {
  /** 0..1 along the axis. */
  readonly at: number;
  readonly label: string;
}

/** Pixel column of a share 0..1 of the x axis. */
export function chartX(frame: Frame, share: number): number {
  return round(EDGE.left + share * (frame.width - EDGE.left - EDGE.right));
}

/** Pixel row of a share 0..1 of the y axis, 0 at the bottom. */
export function chartY(frame: Frame, share: number): number {
  return round(frame.height - EDGE.bottom - share * (frame.height - EDGE.top - EDGE.bottom));
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
  readonly frame: Frame;
  readonly title: string;
  readonly description: string;
  readonly xTitle: string;
  readonly yTitle: string;
  readonly xTicks: readonly Tick[];
  readonly yTicks: readonly Tick[];
  readonly marks: Markup;
  readonly legend?: Markup;
}): Markup {
  const { frame } = parts;
  const { width, height } = frame;
  const { left, right, top, bottom } = EDGE;
  const middleX = (left + width - right) / 2;
  const middleY = (top + height - bottom) / 2;
  return html`<figure class="chart">
<figcaption>${parts.title}</figcaption>${parts.legend ?? null}
<svg viewBox="0 0 ${width} ${height}" role="img" aria-label="${parts.description}">
${parts.yTicks.map(
  (
    tick,
  ) => html`<line class="grid" x1="${left}" x2="${width - right}" y1="${chartY(frame, tick.at)}" y2="${chartY(frame, tick.at)}"/>
<text class="tick" x="${left - 7}" y="${chartY(frame, tick.at) + 4}" text-anchor="end">${tick.label}</text>`,
)}
${parts.marks}
<line class="axis" x1="${left}" x2="${width - right}" y1="${chartY(frame, 0)}" y2="${chartY(frame, 0)}"/>
${parts.xTicks.map(
  (
    tick,
  ) => html`<line class="axis" x1="${chartX(frame, tick.at)}" x2="${chartX(frame, tick.at)}" y1="${chartY(frame, 0)}" y2="${chartY(frame, 0) + 4}"/>
<text class="tick" x="${chartX(frame, tick.at)}" y="${chartY(frame, 0) + 17}" text-anchor="middle">${tick.label}</text>`,
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
