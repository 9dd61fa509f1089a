import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { type Command, InvalidArgumentError } from 'commander';
import { type CommonFlags, readConfiguration, withCommonFlags } from './configuration.ts';
import { UsageFault } from './exit-status.ts';
import { stopSignal } from './stop-signal.ts';

interface ReviewFlags extends CommonFlags {
  readonly host: string;
  readonly port: number;
}

/** Beside the ports that web servers and databases are usually given. */
const DEFAULT_PORT = 8017;
const HIGHEST_PORT = 65_535;

const MORE = `
Examples:
  shiftwork review
  shiftwork review 2031-04-02 --port 9000
  ssh -L 8017:127.0.0.1:8017 HOST     then open http://127.0.0.1:8017/ here

Only reads, so it always works, also while another process measures. There is no login: keep it on the
loopback address, or put something in front of it that asks who comes.
Giving verdicts on these pages comes with a later version.
SIGTERM or Ctrl-C: finish the answers in hand, then end with status 0.`;

/** `shiftwork review [NIGHT]`: serve the reports and catalogues of a workspace. */
export function registerReview(program: Command): void {
  withCommonFlags(program.command('review'))
    .description('serve the reports and the catalogues of the nights to a browser')
    .argument('[night]', 'check that it is there and print its address; the others are served too')
    .option('--host <host>', 'address to listen on', '127.0.0.1')
    .option('--port <number>', 'port to listen on, 0 takes a free one', portNumber, DEFAULT_PORT)
    .addHelpText('after', MORE)
    .action(async (night: string | undefined, flags: ReviewFlags) => {
      const { operating } = await readConfiguration(flags);
      await serve(operating.workspace, night, flags);
    });
}

async function serve(directory: string, night: string | undefined, flags: ReviewFlags): Promise<void> {
  // Loaded here: `shiftwork --help` must not wait for a server and a database driver.
  const [{ isLoopback, nightAddress, reviewServer, shelvedNights }, { workspaceAt }] = await Promise.all([
    import('../report/review/index.ts'),
    import('../worker/workspace.ts'),
  ]);
  const workspace = workspaceAt(directory);
  if (!existsSync(workspace.directory)) {
    throw new UsageFault(`--workspace must be a folder that exists, got ${workspace.directory}`);
  }
  const places = {
    store: workspace.store,
    nights: join(workspace.directory, 'nights'),
    night: (name: string) => workspace.night(name),
  };
  if (night !== undefined && !(await shelvedNights(places)).some(({ name }) => name === night)) {
    throw new UsageFault(`NIGHT must be one of the workspace, got ${night}`);
  }
  const { host, port } = flags;
  const server = reviewServer(places, host, (error) => {
    process.stderr.write(`shiftwork: ${error.message}\n`);
  });
  const stop = stopSignal(() => {
    process.stderr.write('stopping after the answers in hand; once more to stop at once\n');
  });
  try {
    const address = await server.listen({ host, port }).catch(async (error: unknown) => {
      throw await listenFault(error, host, port);
    });
    if (!isLoopback(host)) {
      process.stderr.write(
        `warning: ${host} can be reached from other machines and nobody is asked who they are; ` +
          'whoever reaches it reads every night\n',
      );
    }
    process.stderr.write(
      `review pages at ${address}${night === undefined ? '/' : nightAddress(night)} (Ctrl-C stops)\n`,
    );
    await new Promise<void>((resolve) => {
      if (stop.signal.aborted) resolve();
      stop.signal.addEventListener('abort', () => {
        resolve();
      });
    });
  } finally {
    await server.close();
    stop.release();
  }
}

/** Says what is wrong with the place to listen on: the machine's state, so the status is 4. */
async function listenFault(error: unknown, host: string, port: number): Promise<unknown> {
  const { EnvironmentFault } = await import('../store/index.ts');
  const details: Readonly<Record<string, string>> = {
    EADDRINUSE: `port ${port} of ${host} is taken: stop what listens there, or choose another with --port`,
    EACCES: `port ${port} may not be listened on by this user: choose one above 1023 with --port`,
    EADDRNOTAVAIL: `${host} is no address of this machine: choose another with --host`,
    ENOTFOUND: `${host} is no address that is known here: choose another with --host`,
  };
  const detail = details[(error as NodeJS.ErrnoException).code ?? ''];
  return detail === undefined ? error : new EnvironmentFault(detail, error);
}

function portNumber(text: string): number {
  const port = Number(text);
  if (!/^\d+$/.test(text) || port > HIGHEST_PORT) {
    throw new InvalidArgumentError(`must be a whole number from 0 to ${HIGHEST_PORT}`);
  }
  return port;
}
