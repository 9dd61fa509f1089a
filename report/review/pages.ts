import type { NightCounts } from '../../store/index.ts';
import { html, outside, trusted } from '../page/html.ts';
import type { Insert, Markup } from '../page/html.ts';
import { counted, MISSING, whole } from '../page/numbers.ts';
import { STYLE } from '../page/style.ts';
import { DOWNLOADS, REPORT_FILE } from './downloads.ts';
import type { ShelvedNight } from './night-shelf.ts';

/** Half of a surrogate pair has no UTF-8 and cannot stand in an address. */
const HALF_PAIRS = /\p{Surrogate}/gu;

/** Address of a night's report on this server. */
export function nightAddress(name: string): string {
  return `/nights/${encodeURIComponent(name.replace(HALF_PAIRS, '\u{FFFD}'))}/`;
}

/**
 * The list of nights, the newest name first.
 *
 * @param counts of each night, in the same order
 */
export function nightListPage(
  nights: readonly ShelvedNight[],
  counts: readonly (NightCounts | null)[],
): string {
  const rows = nights.map((night, i) => nightRow(night, counts[i] ?? null)).reverse();
  const lead =
    nights.length === 0
      ? 'Nothing has been measured in this workspace yet: shiftwork run PATH measures a night.'
      : `${counted(nights.length, 'night', 'nights')}. These pages only read; nothing here changes an answer.`;
  return page(
    'Nights',
    html`<p class="lead">${lead}</p>
${rows.length === 0 ? null : nightTable(rows)}`,
  );
}

/** A page that says in plain words why there is nothing to see, and leads back. */
export function refusalPage(title: string, sentence: Insert): string {
  return page(
    title,
    html`<p class="lead">${sentence}</p>
<p><a href="/">All nights</a></p>`,
  );
}

function nightTable(rows: readonly Markup[]): Markup {
  return html`<table><caption class="unseen">Nights of the workspace</caption>
<thead><tr><th scope="col">night</th><th scope="col" class="number">expected</th><th scope="col" class="number">measured</th><th scope="col" class="number">ask for a look</th><th scope="col" class="number">failed</th><th scope="col">catalogue and record</th></tr></thead>
<tbody>${rows}</tbody></table>`;
}

function nightRow(night: ShelvedNight, counts: NightCounts | null): Markup {
  const address = nightAddress(night.name);
  const downloads = Object.keys(DOWNLOADS)
    .filter((file) => night.files.has(file))
    .map((file) => html`<a href="${address}${file}">${file.replace('catalogue.', '')}</a> `);
  const numbers = [counts?.expected, counts?.done, counts?.needsReview, counts?.faults].map(
    (count) => html`<td class="number">${count === undefined ? MISSING : whole(count)}</td>`,
  );
  const name = night.files.has(REPORT_FILE)
    ? html`<a href="${address}">${outside(night.name)}</a>`
    : html`${outside(night.name)} (no report yet)`;
  return html`<tr><th scope="row">${name}</th>${numbers}<td>${downloads.length === 0 ? MISSING : downloads}</td></tr>`;
}

function page(title: string, body: Markup): string {
  return html`<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>${title} · Shiftwork</title>
<style>${trusted(PAGE_STYLE)}</style>
</head>
<body>
<main>
<header><p class="program">Shiftwork · review</p>
<h1>${title}</h1></header>
${body}
</main>
</body>
</html>
`.text;
}

/** The report's own look, and links, which a report has none of. */
export const PAGE_STYLE = `${STYLE}a{color:var(--quasar-text)}a:visited{color:var(--star-text)}
`;
