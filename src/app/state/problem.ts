import { InputError } from "../../quantities/index.ts";

/** Something that went wrong, as it is shown: what, where, and what to do. */
export interface Problem {
  /** What couldn't be done: `T07 could not be opened`. */
  readonly title: string;
  readonly what: string;
  /** File or field at fault; empty when there is none. */
  readonly where: string;
  readonly remedy: string;
  /** For whoever mends the tool; empty when the tool is not at fault. */
  readonly detail: string;
}

/** Any thrown value as a {@link Problem}. */
export function problemOf(title: string, error: unknown): Problem {
  if (error instanceof InputError) {
    return { title, what: error.message, where: error.where, remedy: error.remedy, detail: "" };
  }
  const known = error instanceof Error ? error : new Error(String(error));
  return {
    title,
    what: known.message,
    where: "",
    remedy:
      "This is a fault of Lodewake. Earlier results are kept. Try again; if it happens again, report it with the text below.",
    detail: typeof known.cause === "string" && known.cause ? known.cause : (known.stack ?? known.message),
  };
}
