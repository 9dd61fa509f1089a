import type uPlot from 'uplot';
import type { LineMark } from '../spectrum/payload.ts';
import type { Palette } from './palette.ts';

/** Shades wavelength ranges the fit did not use. */
export function drawMasks(
  plot: uPlot,
  ranges: readonly (readonly [number, number])[],
  colours: Palette,
): void {
  const { ctx, bbox } = plot;
  ctx.save();
  ctx.fillStyle = colours.mask;
  for (const [from, to] of ranges) {
    const left = Math.max(bbox.left, plot.valToPos(from, 'x', true));
    const right = Math.min(bbox.left + bbox.width, plot.valToPos(to, 'x', true));
    // At least one device pixel: a masked single pixel is still a fact.
    if (right >= bbox.left && left <= bbox.left + bbox.width) {
      ctx.fillRect(left, bbox.top, Math.max(1, right - left), bbox.height);
    }
  }
  ctx.restore();
}

/** Labels closer than this many CSS pixels to the one before are left out; their marks stay. */
const LABEL_SPACE = 15;

/** Marks where lines should fall: the best answer's from the top, the runner-up's from the bottom. */
export function drawMarks(
  plot: uPlot,
  marks: readonly LineMark[],
  withRunnerUp: boolean,
  colours: Palette,
): void {
  const { ctx, bbox } = plot;
  const scale = devicePixelRatio;
  ctx.save();
  ctx.font = `${11 * scale}px system-ui, sans-serif`;
  ctx.lineWidth = scale;
  for (const of of ['best', 'runner-up'] as const) {
    if (of === 'runner-up' && !withRunnerUp) continue;
    ctx.strokeStyle = ctx.fillStyle = of === 'best' ? colours.best : colours.runnerUp;
    ctx.setLineDash(of === 'best' ? [] : [4 * scale, 3 * scale]);
    let labelled = -Infinity;
    for (const mark of marks.filter((one) => one.of === of).toSorted((a, b) => a.wavelength - b.wavelength)) {
      const x = plot.valToPos(mark.wavelength, 'x', true);
      if (x < bbox.left || x > bbox.left + bbox.width) continue;
      const reach = bbox.height * 0.13;
      const [from, to] =
        of === 'best'
          ? [bbox.top, bbox.top + reach]
          : [bbox.top + bbox.height - reach, bbox.top + bbox.height];
      ctx.beginPath();
      ctx.moveTo(x, from);
      ctx.lineTo(x, to);
      ctx.stroke();
      if (x - labelled < LABEL_SPACE * scale) continue;
      labelled = x;
      // Upright along the mark: twice as many labels fit as side by side.
      ctx.save();
      ctx.translate(x + 4 * scale, of === 'best' ? to + 3 * scale : from - 3 * scale);
      ctx.rotate(-Math.PI / 2);
      ctx.textAlign = of === 'best' ? 'right' : 'left';
      // A halo in the colour of the card keeps the label readable over data.
      ctx.setLineDash([]);
      ctx.lineWidth = 3 * scale;
      ctx.strokeStyle = colours.card;
      ctx.strokeText(mark.label, 0, 0);
      ctx.fillText(mark.label, 0, 0);
      ctx.restore();
    }
  }
  ctx.restore();
}

/** Marks candidate redshifts with their rank, on the chi-square curve. */
export function drawCandidates(
  plot: uPlot,
  candidates: readonly { readonly redshift: number }[],
  colours: Palette,
): void {
  const { ctx, bbox } = plot;
  const scale = devicePixelRatio;
  ctx.save();
  ctx.font = `600 ${11 * scale}px system-ui, sans-serif`;
  ctx.textAlign = 'center';
  ctx.strokeStyle = ctx.fillStyle = colours.ink;
  ctx.lineWidth = scale;
  ctx.setLineDash([3 * scale, 3 * scale]);
  let before = -Infinity;
  let row = 0;
  for (const { redshift, rank } of candidates
    .map((candidate, i) => ({ redshift: candidate.redshift, rank: i + 1 }))
    .toSorted((a, b) => a.redshift - b.redshift)) {
    const x = plot.valToPos(redshift, 'x', true);
    if (x < bbox.left || x > bbox.left + bbox.width) continue;
    row = x - before < LABEL_SPACE * scale ? row + 1 : 0;
    before = x;
    const top = bbox.top + (13 + 12 * row) * scale;
    ctx.fillText(String(rank), x, top - 2 * scale);
    ctx.beginPath();
    ctx.moveTo(x, top + 2 * scale);
    ctx.lineTo(x, bbox.top + bbox.height);
    ctx.stroke();
  }
  ctx.restore();
}
