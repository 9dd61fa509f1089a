import uPlot from 'uplot';
import { drawCandidates } from './overlays.ts';
import type { Palette } from './palette.ts';
import type { Unpacked } from './unpack.ts';

const HEIGHT = 170;
const FONT = '12px system-ui, sans-serif';

/** Draws chi-square against redshift, one curve per kind, with the candidates numbered. */
export function drawScan(into: HTMLElement, spectrum: Unpacked, colours: Palette): { destroy(): void } {
  const { scan, payload } = spectrum;
  const axis = {
    stroke: colours.muted,
    font: FONT,
    labelFont: FONT,
    grid: { stroke: colours.grid, width: 1 },
    ticks: { stroke: colours.grid },
  };
  return new uPlot(
    {
      width: into.clientWidth,
      height: HEIGHT,
      legend: { show: false },
      cursor: { drag: { x: true, y: false } },
      scales: {
        x: { time: false },
        // Room above the curves for the numbers of the candidates.
        y: { range: (_, low, high) => [low - 0.04 * (high - low || 1), high + 0.25 * (high - low || 1)] },
      },
      axes: [
        { ...axis, size: 30, label: 'redshift', labelSize: 18 },
        { ...axis, size: 62, label: 'chi-square', labelSize: 18 },
      ],
      series: [
        {},
        ...scan.map(
          (one): uPlot.Series => ({
            stroke: colours.kinds[one.kind] ?? colours.ink,
            width: 1.4,
            points: { show: false },
          }),
        ),
      ],
      hooks: { draw: [(plot) => drawCandidates(plot, payload.candidates, colours)] },
    },
    uPlot.join(scan.map((one) => [one.redshift, one.chiSquare] as uPlot.AlignedData)),
    into,
  );
}
