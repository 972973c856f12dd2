import { InputError, Stopped } from "../../src/quantities/index.ts";

/** An error on its way between threads: what structured cloning keeps of ours is too little to tell them apart. */
export type Failure =
  | {
      readonly kind: "input";
      readonly code: string;
      readonly what: string;
      readonly where: string;
      readonly remedy: string;
    }
  | { readonly kind: "stopped" }
  /** The tool itself failed. `detail` is for whoever mends it. */
  | { readonly kind: "fault"; readonly what: string; readonly detail: string };

/** Any thrown value as a {@link Failure}. */
export function failureOf(error: unknown): Failure {
  if (error instanceof InputError) {
    const { code, message, where, remedy } = error;
    return { kind: "input", code, what: message, where, remedy };
  }
  if (error instanceof Stopped) return { kind: "stopped" };
  if (error instanceof Error) return { kind: "fault", what: error.message, detail: error.stack ?? error.name };
  return { kind: "fault", what: String(error), detail: "" };
}

/** The {@link Failure} as something to throw: InputError, Stopped or Error, as it was on the other side. */
export function errorOf(failure: Failure): Error {
  if (failure.kind === "input") return new InputError(failure.code, failure.what, failure.where, failure.remedy);
  if (failure.kind === "stopped") return new Stopped();
  return new Error(failure.what, { cause: failure.detail });
}
