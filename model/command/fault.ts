/** What ends a command: a sentence for stderr, one line or several, and the exit code. */

/** Bad input: a file, a value or an option that cannot be used. */
export const BAD_INPUT = 2;
/** The input was good and the work failed: the disk is full, the memory ran out. */
export const FAILED = 1;

export class CommandFault extends Error {
  readonly exitCode: number;
  constructor(sentence: string, exitCode = BAD_INPUT) {
    super(sentence);
    this.name = 'CommandFault';
    this.exitCode = exitCode;
  }
}

/** Runs work of the model's, whose RangeErrors say what was wrong with the input; `about` goes before the sentence. */
export function judged<T>(about: string, work: () => T): T {
  try {
    return work();
  } catch (error) {
    throw error instanceof RangeError ? new CommandFault(`${about}${error.message}`) : error;
  }
}
