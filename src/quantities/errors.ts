/**
 * An input or a request is wrong, and the person who made it can mend it.
 *
 * Says what is wrong, where, and what to do. The command line prints it and exits with 2; the browser shows it.
 * Anything else that is thrown is a failure of the tool itself (exit 1).
 */
export class InputError extends Error {
  override readonly name = "InputError";
  /** Short stable name of the problem, for machines: `recording-missing`. */
  readonly code: string;
  /** The file, field or option at fault: `trial.json: scale.um_per_px`. */
  readonly where: string;
  /** What to do about it, one sentence. */
  readonly remedy: string;

  constructor(code: string, what: string, where: string, remedy: string) {
    super(what);
    this.code = code;
    this.where = where;
    this.remedy = remedy;
  }
}

/** The person asked to stop. Not an error of anything. */
export class Stopped extends Error {
  override readonly name = "Stopped";
  constructor() {
    super("stopped on request");
  }
}

/** Throws {@link Stopped} when the signal has been raised. */
export function throwIfStopped(signal: AbortSignalLike | undefined): void {
  if (signal?.aborted) throw new Stopped();
}

/** The part of an AbortSignal that pure code needs; a real AbortSignal fits. */
export interface AbortSignalLike {
  readonly aborted: boolean;
}
