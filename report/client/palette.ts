/** Colours of the drawing, taken from the style sheet so that light, dark and paper stay in one place. */
export interface Palette {
  readonly ink: string;
  readonly card: string;
  readonly muted: string;
  readonly grid: string;
  readonly data: string;
  readonly band: string;
  readonly best: string;
  readonly runnerUp: string;
  readonly mask: string;
  readonly kinds: Readonly<Record<string, string>>;
}

export function palette(): Palette {
  const style = getComputedStyle(document.documentElement);
  const colour = (name: string): string => style.getPropertyValue(name).trim();
  return {
    ink: colour('--ink'),
    card: colour('--card'),
    muted: colour('--muted'),
    grid: colour('--grid'),
    data: colour('--plot-data'),
    band: colour('--plot-band'),
    best: colour('--plot-best'),
    runnerUp: colour('--plot-runner-up'),
    mask: colour('--plot-mask'),
    kinds: { galaxy: colour('--galaxy'), quasar: colour('--quasar'), star: colour('--star') },
  };
}
