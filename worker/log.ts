import { join } from 'node:path';
import { type DestinationStream, pino } from 'pino';

/** Structured lines about the work, for those who look after it; never mixed into results. */
export interface WorkLog {
  info(fields: object, message: string): void;
  warn(fields: object, message: string): void;
  error(fields: object, message: string): void;
}

/** A log that keeps nothing. */
export const NO_LOG: WorkLog = { info: () => undefined, warn: () => undefined, error: () => undefined };

/**
 * Opens the log of a workspace: one file per day, JSON lines.
 *
 * @param folder must exist
 * @param now decides the file's name
 */
export function openLog(folder: string, now: Date = new Date()): WorkLog {
  const file = join(folder, `${now.toISOString().slice(0, 10)}.log`);
  // Synchronous: the last lines before a crash are the ones that matter, and there are few lines.
  const destination: DestinationStream = pino.destination({ dest: file, sync: true, append: true });
  return pino({ base: { pid: process.pid }, timestamp: pino.stdTimeFunctions.isoTime }, destination);
}
