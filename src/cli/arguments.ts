import { type ParseArgsConfig, parseArgs } from "node:util";
import { InputError } from "../quantities/index.ts";

type Options = NonNullable<ParseArgsConfig["options"]>;

/**
 * Reads the arguments of a command: its options, and what else was given.
 * @throws InputError for an option the command doesn't have, or one without its value
 */
export function readArguments<O extends Options>(command: string, args: readonly string[], options: O) {
  try {
    return parseArgs({ args: [...args], options, allowPositionals: true, strict: true });
  } catch (error) {
    // Node says more than one sentence; the first says what is wrong.
    const what = (error as Error).message.replace(/\. .*$/s, ".").replace(/([^.])$/, "$1.");
    throw usageError(command, what);
  }
}

/** A request that can't be understood. */
export function usageError(command: string, what: string): InputError {
  const name = command === "" ? "lodewake" : `lodewake ${command}`;
  return new InputError("usage", what, name, `Run "${name} --help" for what it takes.`);
}
