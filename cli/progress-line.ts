/** Between two redrawings on a terminal; faster only flickers. */
const REDRAW_MS = 200;
/** Between two lines where stderr is not a terminal, so that a log stays short. */
const LINE_MS = 10_000;
const BAR_WIDTH = 24;

/** One line that says how far the work is. */
export interface ProgressLine {
  update(done: number): void;
  /** Writes the last state and leaves the line. */
  end(): void;
}

/**
 * A bar with rate and time left on a terminal; elsewhere a plain line now and then.
 *
 * @param label what is being done
 * @param total of the things counted; 0 draws nothing
 * @param now milliseconds, any start
 */
export function progressLine(
  label: string,
  total: number,
  stream: { isTTY?: boolean; write(text: string): unknown } = process.stderr,
  now: () => number = () => performance.now(),
): ProgressLine {
  const start = now();
  let shown = Number.NEGATIVE_INFINITY;
  let done = 0;
  const draw = () => {
    shown = now();
    const text = progressText(label, done, total, (shown - start) / 1_000);
    stream.write(stream.isTTY === true ? `\r\u001b[K${text}` : `${text}\n`);
  };
  return {
    update: (value) => {
      done = value;
      if (total > 0 && now() - shown >= (stream.isTTY === true ? REDRAW_MS : LINE_MS)) draw();
    },
    end: () => {
      if (total === 0) return;
      draw();
      if (stream.isTTY === true) stream.write('\n');
    },
  };
}

/** The line itself: `measure [####    ] 120/720  8.1/s  1 min 14 s left`. */
export function progressText(label: string, done: number, total: number, seconds: number): string {
  const filled = Math.round((BAR_WIDTH * done) / total);
  const bar = `[${'#'.repeat(filled)}${' '.repeat(BAR_WIDTH - filled)}]`;
  const rate = done > 0 && seconds > 0 ? done / seconds : null;
  const rateText = rate === null ? '' : `  ${rate.toPrecision(2)}/s`;
  const left = rate === null || done >= total ? '' : `  ${durationText((total - done) / rate)} left`;
  return `${label} ${bar} ${done}/${total}${rateText}${left}`;
}

/** `45 s`, `3 min 20 s`, `2 h 5 min`. */
export function durationText(seconds: number): string {
  const whole = Math.round(seconds);
  if (whole < 60) return `${whole} s`;
  if (whole < 3_600) return `${Math.floor(whole / 60)} min ${whole % 60} s`;
  return `${Math.floor(whole / 3_600)} h ${Math.floor((whole % 3_600) / 60)} min`;
}
