import type { NightFacts } from '../../store/night-reader.ts';
import { html, outside } from './html.ts';
import type { Insert, Markup } from './html.ts';
import { fixed, MISSING } from './numbers.ts';

/** How the night was measured: time per stage, and what the numbers depend on. */
export function howMeasured(facts: NightFacts): Markup {
  const stages = Object.entries(facts.stageMs);
  const total = stages.reduce((sum, [, ms]) => sum + ms, 0);
  const entries: readonly (readonly [string, Insert])[] = [
    ['started', facts.startedAt ?? MISSING],
    ['finished', facts.finishedAt ?? MISSING],
    ['run', facts.runId === null ? MISSING : outside(facts.runId)],
    ['recipe', facts.recipeHash === null ? MISSING : html`<code>${facts.recipeHash}</code>`],
    ...Object.entries(facts.provenance).map(([name, value]): readonly [string, Insert] => [
      name,
      isPlain(value)
        ? outside(String(value))
        : html`<details><summary>show</summary><pre>${JSON.stringify(value, null, 1)}</pre></details>`,
    ]),
  ];
  return html`<section aria-labelledby="h-how"><h2 id="h-how">How this night was measured</h2><div class="pair">
<table class="facts-table"><caption>What the numbers depend on</caption><tbody>${entries.map(
    ([name, value]) => html`<tr><th scope="row">${name}</th><td>${value}</td></tr>`,
  )}</tbody></table>
${
  stages.length === 0
    ? html`<p>No times were recorded.</p>`
    : html`<table class="facts-table"><caption>Time per spectrum, mean</caption><tbody>${stages.map(
        ([stage, ms]) =>
          html`<tr><th scope="row">${stage}</th><td class="number">${fixed(ms, 2)} ms</td></tr>`,
      )}<tr><th scope="row">together</th><td class="number">${fixed(total, 2)} ms</td></tr></tbody></table>`
}
</div></section>`;
}

function isPlain(value: unknown): value is string | number | boolean | null {
  return value === null || ['string', 'number', 'boolean'].includes(typeof value);
}
