import uPlot from 'uplot';
import { drawMasks, drawMarks } from './overlays.ts';
import type { Palette } from './palette.ts';
import type { Arm, Unpacked } from './unpack.ts';

/** Drawn plots of one card, to be destroyed when the card is far off screen. */
export interface Drawn {
  destroy(): void;
  showRunnerUp(shown: boolean): void;
  showMarks(shown: boolean): void;
}

const MAIN_HEIGHT = 280;
const RESIDUAL_HEIGHT = 128;
/** Residuals beyond this many sigma are drawn at the edge: they are seen, and the rest stays readable. */
const RESIDUAL_REACH = 6;
/** Of the height of the data, above and below them: there stand the names of the lines. */
const ROOM_FOR_LABELS = 0.25;
const LEFT_AXIS = 62;
const FONT = '12px system-ui, sans-serif';

type Series = (number | null)[];

/**
 * Draws data, best model and runner-up, and the residuals below, sharing one wavelength axis. The error band lies
 * around the model, where it can be seen: around data this dense it would vanish under them.
 */
export function drawSpectrum(into: HTMLElement, spectrum: Unpacked, colours: Palette): Drawn {
  const state = { marks: true };
  const { arms } = spectrum;
  const width = into.clientWidth;
  const masked = arms.flatMap((arm) => arm.payload.masked);
  const fluxRange = robustRange(arms);
  const zoomTogether = (from: uPlot, to: () => uPlot | undefined): void => {
    const other = to();
    const { min, max } = from.scales['x']!;
    if (other === undefined || min == null || max == null) return;
    if (other.scales['x']!.min !== min || other.scales['x']!.max !== max) other.setScale('x', { min, max });
  };
  let main: uPlot | undefined;
  let residual: uPlot | undefined;

  const perArm = (arm: Arm): Series[] => [
    arm.flux,
    combine(arm.model, arm.error, (model, error) => model + error),
    combine(arm.model, arm.error, (model, error) => model - error),
    arm.model,
    arm.runnerUp ?? arm.model.map(() => null),
  ];
  const tables = arms.map((arm) => [arm.wavelength, ...perArm(arm)] as uPlot.AlignedData);
  const clamp = (value: number): number => Math.max(-RESIDUAL_REACH, Math.min(RESIDUAL_REACH, value));
  const residuals = arms.map(
    (arm) =>
      [
        arm.wavelength,
        arm.flux.map((flux, i) => {
          const model = arm.model[i];
          const error = arm.error[i];
          return flux === null || model == null || error == null || error <= 0
            ? null
            : clamp((flux - model) / error);
        }),
      ] as uPlot.AlignedData,
  );

  const SERIES_PER_ARM = 5;
  const axis = {
    stroke: colours.muted,
    font: FONT,
    labelFont: FONT,
    grid: { stroke: colours.grid, width: 1 },
    ticks: { stroke: colours.grid },
  };
  main = new uPlot(
    {
      width,
      height: MAIN_HEIGHT,
      legend: { show: false },
      cursor: { sync: { key: `s${spectrumNumber++}`, setSeries: false }, drag: { x: true, y: false } },
      scales: { x: { time: false }, y: { range: (_, low, high) => fluxRange ?? [low, high] } },
      axes: [
        { ...axis, size: 4, ticks: { show: false }, values: (_, values) => values.map(() => '') },
        {
          ...axis,
          size: LEFT_AXIS,
          label: 'flux, input unit',
          labelSize: 18,
          values: (_, values) => values.map(shortNumber),
        },
      ],
      series: [
        {},
        ...arms.flatMap((): uPlot.Series[] => [
          { stroke: colours.data, width: 1, points: { show: false } },
          { stroke: 'transparent', width: 0, points: { show: false } },
          { stroke: 'transparent', width: 0, points: { show: false } },
          { stroke: colours.best, width: 1.8, points: { show: false } },
          { stroke: colours.runnerUp, width: 1.8, dash: [6, 4], points: { show: false }, show: false },
        ]),
      ],
      bands: arms.map((_, i) => ({
        series: [SERIES_PER_ARM * i + 2, SERIES_PER_ARM * i + 3] as [number, number],
        fill: colours.band,
      })),
      hooks: {
        drawClear: [(plot) => drawMasks(plot, masked, colours)],
        draw: [(plot) => state.marks && drawMarks(plot, spectrum.payload.marks, shownRunnerUp, colours)],
        setScale: [(plot, key) => key === 'x' && zoomTogether(plot, () => residual)],
      },
    },
    uPlot.join(tables),
    into,
  );
  let shownRunnerUp = false;

  residual = new uPlot(
    {
      width,
      height: RESIDUAL_HEIGHT,
      legend: { show: false },
      cursor: { drag: { x: true, y: false } },
      scales: { x: { time: false }, y: { range: [-RESIDUAL_REACH, RESIDUAL_REACH] } },
      axes: [
        { ...axis, size: 30, label: 'wavelength in vacuum as read, Å', labelSize: 18 },
        { ...axis, size: LEFT_AXIS, label: 'residual, σ', labelSize: 18, splits: [-5, 0, 5] },
      ],
      series: [
        {},
        ...arms.map((): uPlot.Series => ({ stroke: colours.data, width: 1, points: { show: false } })),
      ],
      hooks: {
        drawClear: [(plot) => drawMasks(plot, masked, colours)],
        setScale: [(plot, key) => key === 'x' && zoomTogether(plot, () => main)],
      },
    },
    uPlot.join(residuals),
    into,
  );
  return {
    destroy: () => {
      main.destroy();
      residual.destroy();
    },
    showRunnerUp: (shown) => {
      shownRunnerUp = shown;
      arms.forEach((_, i) => main.setSeries(SERIES_PER_ARM * i + 5, { show: shown }));
    },
    showMarks: (shown) => {
      state.marks = shown;
      main.redraw(false);
    },
  };
}

let spectrumNumber = 0;

function combine(a: Series, b: Series, f: (a: number, b: number) => number): Series {
  return a.map((value, i) => {
    const other = b[i];
    return value === null || other == null ? null : f(value, other);
  });
}

/** Flux axis over the central 99 % of the data and all of the best model, so that a cosmic ray cannot set it. */
function robustRange(arms: readonly Arm[]): [number, number] | null {
  const flux = arms
    .flatMap((arm) => arm.flux.filter((value): value is number => value !== null))
    .sort((a, b) => a - b);
  if (flux.length === 0) return null;
  const at = (share: number): number => flux[Math.round(share * (flux.length - 1))]!;
  const models = arms.flatMap((arm) => arm.model.filter((value): value is number => value !== null));
  const low = Math.min(at(0.005), ...models);
  const high = Math.max(at(0.995), ...models);
  const height = high - low || 1;
  return [low - ROOM_FOR_LABELS * height, high + ROOM_FOR_LABELS * height];
}

/** Three digits; powers of ten where needed. */
function shortNumber(value: number): string {
  if (value === 0) return '0';
  const size = Math.abs(value);
  return size >= 1e5 || size < 1e-3 ? value.toExponential(1) : String(Number(value.toPrecision(3)));
}
