import { InputFault } from '../../pipeline/errors.ts';

/** The InputFault that `action` throws; any other outcome fails the test. */
export function faultOf(action: () => unknown): InputFault {
  try {
    action();
  } catch (error) {
    if (error instanceof InputFault) return error;
    throw error;
  }
  throw new Error('an InputFault must be thrown, got none');
}
