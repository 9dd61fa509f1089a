export { COLUMNS } from './catalogue/columns.ts';
export type { Column, ColumnType } from './catalogue/columns.ts';
export type { PlotLimits } from './page/flagged-section.ts';
export { PLOT_LIMITS } from './page/night-page.ts';
export { writeNightOutputs } from './write-night-outputs.ts';
