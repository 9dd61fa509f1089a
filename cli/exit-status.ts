import { CommanderError } from 'commander';

/** What the program says to the shell when it ends. */
export const EXIT = {
  complete: 0,
  /** An expected spectrum has no row, or something failed that should not. */
  missing: 1,
  usage: 2,
  busy: 3,
  environment: 4,
  /** 128 + SIGINT, the shells' convention. */
  interrupted: 130,
} as const;

/** Names of errors (see their classes) and the status they end with. */
const STATUS_BY_NAME: Readonly<Record<string, number>> = {
  PathFault: EXIT.usage,
  OptionFault: EXIT.usage,
  ProfileFault: EXIT.usage,
  UsageFault: EXIT.usage,
  InputFault: EXIT.usage,
  WorkspaceBusy: EXIT.busy,
  EnvironmentFault: EXIT.environment,
};

/** Wrong use of a verb that the parser of the command line cannot see. */
export class UsageFault extends Error {
  override readonly name = 'UsageFault';
}

/**
 * Runs the command line and turns whatever it throws into a line on stderr and a status. By name, not by
 * class: loading the classes would load the database before `--help` can print.
 *
 * @returns the status; the verb's own (process.exitCode) when nothing was thrown
 */
export async function statusOf(run: () => Promise<unknown>): Promise<number> {
  try {
    await run();
    return Number(process.exitCode ?? EXIT.complete);
  } catch (error) {
    if (error instanceof CommanderError) return error.exitCode === 0 ? EXIT.complete : EXIT.usage;
    const { name, message, stack } = error as Error;
    const status = STATUS_BY_NAME[name];
    const systemCode = (error as NodeJS.ErrnoException).code;
    if (
      status === undefined &&
      (systemCode === 'ENOSPC' || systemCode === 'EACCES' || systemCode === 'EROFS')
    ) {
      process.stderr.write(`shiftwork: ${message}\n`);
      return EXIT.environment;
    }
    // A bug: its stack is what a report of it needs.
    process.stderr.write(
      status === undefined ? `shiftwork: ${stack ?? message}\n` : `shiftwork: ${message}\n`,
    );
    return status ?? EXIT.missing;
  }
}
