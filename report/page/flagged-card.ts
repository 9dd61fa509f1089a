import type { CandidateSummary, LineMeasurement, Reason } from '../../pipeline/weigh/answer.ts';
import type { CatalogueRow } from '../../store/catalogue-row.ts';
import type { SpectrumDetail } from '../../store/night-reader.ts';
import { reasonMeaning, reasonWords } from '../night/reason-meanings.ts';
import { html, outside } from './html.ts';
import type { Insert, Markup } from './html.ts';
import { answerInWords, fixed, MISSING, percent } from './numbers.ts';

/** Where the curves of a card come from: embedded, left out for size, or never kept. */
export type PlotState = 'embedded' | 'left-out' | 'not-kept';

const CANDIDATES_SHOWN = 5;
const LINES_SHOWN = 8;

/**
 * One flagged spectrum: who it is, why it is here, what the program thinks, the facts.
 *
 * @param index position in the list; names the card and its curves in the page
 */
export function flaggedCard(
  row: CatalogueRow,
  detail: SpectrumDetail,
  index: number,
  plot: PlotState,
): Markup {
  const words = reasonWords(row.reasons);
  return html`<article class="card" id="card-${index}" data-index="${index}" data-plot="${plot}"
 data-id="${row.spectrum_id}" data-name="${row.target_name ?? ''}" data-kind="${row.kind ?? 'none'}" data-reasons="${words.join(' ')}"
 data-confidence="${row.confidence ?? ''}" data-fibre="${row.fibre ?? ''}" data-snr="${row.signal_to_noise_per_angstrom ?? ''}">
<h3>${row.target_name === null ? 'unnamed target' : outside(row.target_name)} <span class="answer tone-text-${row.kind ?? 'none'}">${answerInWords(row)}</span></h3>
<p class="place">confidence <strong>${percent(row.confidence)}</strong> · fibre ${row.fibre ?? MISSING} · class ${row.target_class === null ? MISSING : outside(row.target_class)} · <code>${outside(row.spectrum_id)}</code></p>
<ul class="why">${reasonItems(words, detail.reasons)}</ul>
<div class="body"><div class="plots">${plotPlaceholder(plot)}</div>
<div class="facts">${facts(row)}${candidateTable(detail.candidates)}${lineTable(detail.lines)}</div></div>
</article>`;
}

/** The sentence of each reason; a word without a recorded sentence is explained in general. */
function reasonItems(words: readonly string[], reasons: readonly Reason[]): Insert {
  const sentences = new Map<string, string>(reasons.map((reason) => [reason.word, reason.sentence]));
  const all = [...new Set([...words, ...sentences.keys()])];
  if (all.length === 0) return html`<li>No redshift was found, and no reason was recorded.</li>`;
  return all.map(
    (word) =>
      html`<li><span class="reason">${word}</span> ${sentences.get(word) ?? reasonMeaning(word)}</li>`,
  );
}

function plotPlaceholder(plot: PlotState): Markup {
  const sentence = {
    embedded: 'The plot appears here when the page may run its script.',
    'left-out':
      'Not plotted: this report is at its size limit. Write it again with a higher limit to see the plot.',
    'not-kept': 'Nothing to plot: no curves were kept for this spectrum.',
  }[plot];
  return html`<p class="no-plot">${sentence}</p>`;
}

/** What is known of the row; what is missing is left out, so that an unreadable row is short. */
function facts(row: CatalogueRow): Markup {
  const when = (value: unknown, shown: () => Insert): Insert => (value === null ? null : shown());
  const entries: readonly (readonly [string, Insert])[] = [
    ['template family', row.family],
    [
      'probabilities',
      when(
        row.probability_none,
        () =>
          `galaxy ${percent(row.probability_galaxy)}, quasar ${percent(row.probability_quasar)}, star ${percent(row.probability_star)}, none ${percent(row.probability_none)}`,
      ),
    ],
    [
      'signal-to-noise per ångström',
      when(row.signal_to_noise_per_angstrom, () => fixed(row.signal_to_noise_per_angstrom, 2)),
    ],
    [
      'magnitude',
      when(row.magnitude, () => [fixed(row.magnitude, 2), ' ', outside(row.magnitude_band ?? '')]),
    ],
    [
      'chi-square / degrees of freedom',
      when(row.chi_square, () => `${fixed(row.chi_square, 0)} / ${row.degrees_of_freedom ?? MISSING}`),
    ],
    ['chi-square margin to runner-up', when(row.chi_square_margin, () => fixed(row.chi_square_margin, 1))],
    [
      'correlation peak, r',
      when(row.correlation_peak, () => `${fixed(row.correlation_peak, 2)}, ${fixed(row.correlation_r, 1)}`),
    ],
    ['emission lines found', row.lines_detected],
    ['strongest line, sigma', when(row.strongest_line_snr, () => fixed(row.strongest_line_snr, 1))],
    ['usable pixels', when(row.good_fraction, () => percent(row.good_fraction))],
    ['stated errors × factor = scatter', when(row.noise_factor, () => fixed(row.noise_factor, 2))],
    ['barycentric correction', barycentric(row)],
    ['position (ICRS)', when(row.ra, () => `${fixed(row.ra, 5)}°, ${fixed(row.dec, 5)}°`)],
    ['observed at, UTC', row.observed_at],
    ['exposure', when(row.exposure_s, () => `${fixed(row.exposure_s, 0)} s`)],
    [
      'input',
      [
        outside(row.input_file),
        row.input_hdu === null ? null : `, HDU ${row.input_hdu}`,
        row.input_row === null ? null : `, row ${row.input_row}`,
      ],
    ],
  ];
  return html`<dl>${entries
    .filter(([, value]) => value !== null)
    .map(([name, value]) => html`<div><dt>${name}</dt><dd>${value}</dd></div>`)}</dl>`;
}

function barycentric(row: CatalogueRow): Insert {
  if (row.barycentric_correction_km_s === null) return row.barycentric_source;
  return `${fixed(row.barycentric_correction_km_s, 2)} km/s (${row.barycentric_source ?? MISSING})`;
}

function candidateTable(candidates: readonly CandidateSummary[]): Markup | null {
  if (candidates.length === 0) return null;
  return html`<table class="small"><caption>Candidates</caption><thead><tr><th scope="col">kind</th><th scope="col">family</th><th scope="col" class="number">redshift</th><th scope="col" class="number">chi-square</th><th scope="col" class="number">probability</th></tr></thead>
<tbody>${candidates
    .slice(0, CANDIDATES_SHOWN)
    .map(
      (candidate) =>
        html`<tr><td>${candidate.kind}</td><td>${candidate.family}</td><td class="number">${fixed(candidate.redshift, 5)}</td><td class="number">${fixed(candidate.chiSquare, 1)}</td><td class="number">${percent(candidate.probability)}</td></tr>`,
    )}</tbody></table>`;
}

function lineTable(lines: readonly LineMeasurement[]): Markup | null {
  if (lines.length === 0) return null;
  const strongest = lines
    .toSorted((a, b) => Math.abs(b.signalToNoise) - Math.abs(a.signalToNoise))
    .slice(0, LINES_SHOWN);
  return html`<table class="small"><caption>Lines measured at this redshift</caption><thead><tr><th scope="col">line</th><th scope="col" class="number">observed, Å</th><th scope="col" class="number">width, Å</th><th scope="col" class="number">S/N</th></tr></thead>
<tbody>${strongest.map(
    (line) =>
      html`<tr><td>${line.name}</td><td class="number">${fixed(line.wavelengthObservedAngstrom, 1)}</td><td class="number">${fixed(line.equivalentWidthAngstrom, 1)}</td><td class="number">${fixed(line.signalToNoise, 1)}</td></tr>`,
  )}</tbody></table>`;
}
