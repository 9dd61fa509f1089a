import { EXIT } from './exit-status.ts';

/**
 * Ctrl-C or SIGTERM once: stop taking work and finish what is in hand. Twice: end at once, which loses only
 * what is in hand.
 *
 * @param onFirst told once, to say what is happening
 * @returns the signal, and a way to stop listening
 */
export function stopSignal(onFirst: () => void): { signal: AbortSignal; release(): void } {
  const controller = new AbortController();
  const stop = () => {
    if (controller.signal.aborted) process.exit(EXIT.interrupted);
    controller.abort();
    onFirst();
  };
  process.on('SIGINT', stop);
  process.on('SIGTERM', stop);
  return {
    signal: controller.signal,
    release: () => {
      process.off('SIGINT', stop);
      process.off('SIGTERM', stop);
    },
  };
}
