import { histogram } from '../night/histogram.ts';
import { reasonMeaning } from '../night/reason-meanings.ts';
import type { NightSummary } from '../night/summary.ts';
import { chart, chartX, chartY, FULL_WIDTH, HALF_WIDTH, round } from './chart.ts';
import { html } from './html.ts';
import type { Markup } from './html.ts';
import { counted, fixed, percent, whole } from './numbers.ts';
import { stackedBars } from './stacked-bars.ts';
import { ticks } from './ticks.ts';

const CONFIDENCE_BINS = 20;
const REDSHIFT_BINS = 40;
const VELOCITY_BINS = 40;
/** Redshifts worth a label; the axis is even in ln(1+z), where a bin is a range of velocity. */
const REDSHIFT_LABELS: readonly number[] = [0, 0.1, 0.2, 0.3, 0.5, 0.7, 1, 1.5, 2, 3, 4, 5, 6];

/** How sure the program is of its answers. */
export function confidenceChart(summary: NightSummary): Markup {
  const counts = (values: readonly number[]): readonly number[] =>
    histogram(values, 0, 1, CONFIDENCE_BINS).counts;
  return stackedBars({
    frame: HALF_WIDTH,
    title: 'How sure the answers are',
    description: `Histogram of confidence from 0 to 1 for ${whole(summary.outcomes.accepted)} accepted and ${whole(summary.outcomes.flagged)} flagged spectra.`,
    xTitle: 'confidence: probability that the redshift is right',
    yTitle: 'spectra',
    xTicks: [0, 0.2, 0.4, 0.6, 0.8, 1].map((value) => ({ at: value, label: percent(value) })),
    layers: [
      { tone: 'tone-accepted', label: 'accepted', counts: counts(summary.confidences.accepted) },
      { tone: 'tone-flagged', label: 'flagged', counts: counts(summary.confidences.flagged) },
    ],
  });
}

/** Redshifts of accepted galaxies and quasars. */
export function redshiftChart(summary: NightSummary): Markup {
  const { galaxy, quasar } = summary.redshifts;
  const highest = Math.max(0.1, ...galaxy, ...quasar);
  const end = Math.log1p(highest * 1.02);
  const counts = (values: readonly number[]): readonly number[] =>
    histogram(
      values.map((z) => Math.log1p(Math.max(0, z))),
      0,
      end,
      REDSHIFT_BINS,
    ).counts;
  const shown = REDSHIFT_LABELS.filter((z) => Math.log1p(z) <= end);
  return stackedBars({
    frame: HALF_WIDTH,
    title: 'Redshifts of galaxies and quasars, accepted',
    description: `Histogram of redshift for ${counted(galaxy.length, 'galaxy', 'galaxies')} and ${counted(quasar.length, 'quasar', 'quasars')}, up to ${fixed(highest, 2)}.`,
    xTitle: 'redshift z (bins even in ln(1 + z))',
    yTitle: 'spectra',
    xTicks: spaced(shown.map((z) => ({ at: Math.log1p(z) / end, label: String(z) }))),
    layers: [
      { tone: 'tone-galaxy', label: 'galaxy', counts: counts(galaxy) },
      { tone: 'tone-quasar', label: 'quasar', counts: counts(quasar) },
    ],
  });
}

/** Velocities of accepted stars. */
export function velocityChart(summary: NightSummary): Markup {
  const velocities = summary.starVelocities;
  const reach = Math.max(100, ...velocities.map((velocity) => Math.abs(velocity))) * 1.02;
  return stackedBars({
    frame: HALF_WIDTH,
    title: 'Velocities of stars, accepted',
    description: `Histogram of the barycentric velocity of ${counted(velocities.length, 'star', 'stars')}.`,
    xTitle: 'barycentric velocity, km/s',
    yTitle: 'spectra',
    xTicks: ticks(-reach, reach, 7).map((value) => ({
      at: (value + reach) / (2 * reach),
      label: fixed(value, 0),
    })),
    layers: [
      {
        tone: 'tone-star',
        label: 'star',
        counts: histogram(velocities, -reach, reach, VELOCITY_BINS).counts,
      },
    ],
  });
}

/** Share accepted against signal-to-noise, with one-sigma intervals. */
export function successChart(summary: NightSummary): Markup {
  const bins = summary.success;
  const label = (value: number): string => (value === Infinity ? '∞' : String(value));
  return chart({
    frame: HALF_WIDTH,
    title: 'Accepted against signal-to-noise',
    description: `Share of spectra accepted per range of signal-to-noise: ${bins
      .filter((bin) => bin.accepted.share !== null)
      .map((bin) => `${label(bin.from)} to ${label(bin.to)}: ${percent(bin.accepted.share)}`)
      .join('; ')}.`,
    xTitle: 'median signal-to-noise per ångström',
    yTitle: 'share accepted',
    xTicks: [...bins.map((bin) => bin.from), Infinity].map((edge, i) => ({
      at: i / bins.length,
      label: label(edge),
    })),
    yTicks: [0, 0.25, 0.5, 0.75, 1].map((value) => ({ at: value * TOP, label: percent(value) })),
    marks: html`${bins.map((bin, i) => {
      const { share, low, high, of, hits } = bin.accepted;
      if (share === null) return null;
      const left = chartX(HALF_WIDTH, (i + 0.1) / bins.length);
      const right = chartX(HALF_WIDTH, (i + 0.9) / bins.length);
      const middle = chartX(HALF_WIDTH, (i + 0.5) / bins.length);
      const y = chartY(HALF_WIDTH, share * TOP);
      return html`<rect class="tone-accepted soft" x="${left}" y="${y}" width="${round(right - left)}" height="${round(chartY(HALF_WIDTH, 0) - y)}"/>
<line class="whisker" x1="${middle}" x2="${middle}" y1="${chartY(HALF_WIDTH, low * TOP)}" y2="${chartY(HALF_WIDTH, high * TOP)}"/>
<text class="tick" x="${middle}" y="${chartY(HALF_WIDTH, high * TOP) - 4}" text-anchor="middle">${hits}/${of}</text>`;
    })}`,
  });
}

/** Where 100 % stands, so that the counts above full bars stay inside the frame. */
const TOP = 0.92;

/** How often each reason was given, with its meaning. */
export function reasonTable(summary: NightSummary): Markup {
  if (summary.reasons.length === 0) return html`<p>No spectrum carries a reason.</p>`;
  const highest = summary.reasons[0]!.count;
  return html`<table class="reasons"><caption>Why spectra were flagged or noted. One spectrum may have several reasons.</caption>
<thead><tr><th scope="col">reason</th><th scope="col">meaning</th><th scope="col" class="number">spectra</th><th scope="col"><span class="unseen">bar</span></th></tr></thead>
<tbody>${summary.reasons.map(
    ({
      word,
      count,
    }) => html`<tr><th scope="row"><span class="reason">${word}</span></th><td>${reasonMeaning(word)}</td><td class="number">${whole(count)}</td>
<td><svg class="bar" viewBox="0 0 120 10" aria-hidden="true"><rect class="tone-flagged" width="${round((120 * count) / highest)}" height="10"/></svg></td></tr>`,
  )}</tbody></table>`;
}

/** Accepted and failed spectra of each fibre; fibres that fail beyond chance are named below. */
export function fibreChart(summary: NightSummary): Markup {
  const fibres = summary.fibres;
  if (fibres.length === 0) return html`<p>No spectrum names its fibre.</p>`;
  // By rank, not by number: fibre numbers may have holes of any size.
  const bars = stackedBars({
    frame: FULL_WIDTH,
    title: 'By fibre',
    description: `Accepted and failed spectra of ${whole(fibres.length)} fibres. ${oddFibreSentence(summary)}`,
    xTitle: 'fibre (in order of number)',
    yTitle: 'spectra',
    xTicks: ticks(0, fibres.length - 1, 10)
      .filter((rank) => Number.isInteger(rank))
      .map((rank) => ({ at: (rank + 0.5) / fibres.length, label: String(fibres[rank]!.fibre) })),
    layers: [
      { tone: 'tone-flagged', label: 'flagged or unreadable', counts: fibres.map((tally) => tally.failed) },
      { tone: 'tone-accepted', label: 'accepted', counts: fibres.map((tally) => tally.accepted) },
    ],
  });
  return html`${bars}<p class="note">${oddFibreSentence(summary)}</p>`;
}

function oddFibreSentence(summary: NightSummary): string {
  if (summary.oddFibres.length === 0) return 'No fibre fails more often than chance allows.';
  const named = summary.oddFibres
    .slice(0, 10)
    .map(({ fibre, failed, accepted }) => `${fibre} (${failed} of ${failed + accepted})`)
    .join(', ');
  const more = summary.oddFibres.length > 10 ? ` and ${summary.oddFibres.length - 10} more` : '';
  return `Failing more often than chance allows: fibre ${named}${more}.`;
}

/** Drops labels that would run into the one before: closer than a sixteenth of the axis. */
function spaced<T extends { readonly at: number }>(marks: readonly T[]): readonly T[] {
  const kept: T[] = [];
  for (const mark of marks) {
    const before = kept.at(-1);
    if (before === undefined || mark.at - before.at >= 1 / 16) kept.push(mark);
  }
  return kept;
}
