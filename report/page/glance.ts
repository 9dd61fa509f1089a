import type { NightFacts } from '../../store/night-reader.ts';
import type { NightSummary, OutcomeCounts } from '../night/summary.ts';
import { round } from './chart.ts';
import { html, outside } from './html.ts';
import type { Insert, Markup } from './html.ts';
import { counted, fixed, whole } from './numbers.ts';

/** The first screen: what was expected, what came of it, in numbers. */
export function glance(facts: NightFacts, summary: NightSummary): Markup {
  const { accepted, flagged, unreadable, sky } = summary.outcomes;
  return html`<header>
<p class="program">Shiftwork · report of the night</p>
<h1>${outside(facts.name)}</h1>
<p class="lead">${leadSentence(summary)}</p>
<ul class="tiles">
${tile('expected', summary.expected, 'spectra put on the queue')}
${tile('measured', summary.rows, summary.missing === 0 ? 'have a row, all of them' : `have a row, ${whole(summary.missing)} do not`)}
${tile('accepted', accepted, 'ready to use', 'accepted')}
${tile('flagged', flagged, 'look before use', 'flagged')}
${tile('unreadable', unreadable, 'could not be read', 'unreadable')}
${sky > 0 ? tile('sky', sky, 'sky fibres, nothing to measure') : null}
</ul></header>
<section aria-labelledby="h-found"><h2 id="h-found">What came of the spectra</h2><div class="pair">
${countTable(
  'By kind of the answer',
  'kind',
  summary.byKind.map(({ kind, counts }) => [kind ?? 'no answer', counts]),
)}
${countTable(
  'By target class of the survey',
  'class',
  summary.byClass.map(({ targetClass, counts }) => [outside(targetClass), counts]),
)}
</div></section>`;
}

function leadSentence(summary: NightSummary): string {
  const { accepted, flagged, unreadable } = summary.outcomes;
  const objects = accepted + flagged + unreadable;
  if (objects === 0) return 'No spectrum of an object has been measured yet.';
  const missing =
    summary.missing === 0
      ? ''
      : ` ${counted(summary.missing, 'expected spectrum has', 'expected spectra have')} no row yet: run the night again to finish it.`;
  return `${counted(accepted, 'spectrum', 'spectra')} of ${whole(objects)} got an answer you can use (${fixed((100 * accepted) / objects, 1)} %); ${whole(flagged)} should be looked at and ${whole(unreadable)} could not be read.${missing}`;
}

function tile(name: string, value: number, meaning: string, tone = ''): Markup {
  return html`<li class="tile ${tone}"><strong>${whole(value)}</strong><span class="tile-name">${name}</span><span class="tile-meaning">${meaning}</span></li>`;
}

function countTable(
  caption: string,
  heading: string,
  rows: readonly (readonly [Insert, OutcomeCounts])[],
): Markup {
  const total = ({ accepted, flagged, unreadable }: OutcomeCounts): number => accepted + flagged + unreadable;
  const most = Math.max(1, ...rows.map(([, counts]) => total(counts)));
  return html`<table class="counts"><caption>${caption}</caption>
<thead><tr><th scope="col">${heading}</th><th scope="col" class="number">accepted</th><th scope="col" class="number">flagged</th><th scope="col" class="number">unreadable</th><th scope="col"><span class="unseen">bar</span></th></tr></thead>
<tbody>${rows
    .filter(([, counts]) => total(counts) > 0)
    .map(
      ([name, counts]) =>
        html`<tr><th scope="row">${name}</th><td class="number">${whole(counts.accepted)}</td><td class="number">${whole(counts.flagged)}</td><td class="number">${whole(counts.unreadable)}</td><td>${outcomeBar(counts, most)}</td></tr>`,
    )}</tbody></table>`;
}

function outcomeBar(counts: OutcomeCounts, most: number): Markup {
  let x = 0;
  const parts = (['accepted', 'flagged', 'unreadable'] as const).map((outcome) => {
    const width = round((120 * counts[outcome]) / most);
    const rect = html`<rect class="tone-${outcome}" x="${round(x)}" width="${width}" height="10"/>`;
    x += width;
    return width > 0 ? rect : null;
  });
  return html`<svg class="bar" viewBox="0 0 120 10" aria-hidden="true">${parts}</svg>`;
}
