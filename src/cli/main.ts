#!/usr/bin/env node
import { InputError } from "../quantities/index.ts";
import { usageError } from "./arguments.ts";
import type { Io } from "./io.ts";
import { errorJson, errorText, machineIo, personIo } from "./terminal.ts";
import { tool } from "./tool.ts";

interface Command {
  readonly help: string;
  run(args: readonly string[], json: boolean, io: Io): Promise<void>;
}

/** Commands by name. Each is loaded when it is asked for: measuring needs much that help and errors don't. */
const commands: Readonly<Record<string, { readonly about: string; load(): Promise<Command> }>> = {
  measure: {
    about: "measure one trial",
    load: async () => {
      const { help, measure } = await import("./commands/measure.ts");
      return { help, run: measure };
    },
  },
  workbench: {
    about: "serve the workbench to this computer's browser",
    load: async () => {
      const { help, workbench } = await import("./commands/workbench.ts");
      return { help, run: (args, _, io) => workbench(args, io) };
    },
  },
  assay: {
    about: "make a synthetic trial whose truth is known",
    load: async () => {
      const { help, assay } = await import("./commands/assay.ts");
      return { help, run: (args, _, io) => assay(args, io) };
    },
  },
};

const help = `lodewake COMMAND [options]

Measures magnetotactic bacteria from video: calibrated speeds with 95 % intervals.

${Object.entries(commands)
  .map(([name, { about }]) => `  ${name.padEnd(12)}${about}`)
  .join("\n")}

lodewake COMMAND --help says what a command takes. lodewake --version prints the version.
Exit codes: 0 done, 2 the request or an input is wrong, 1 Lodewake failed.`;

async function run(args: readonly string[], json: boolean, io: Io): Promise<void> {
  const [name, ...rest] = args;
  if (name === "--version") return io.out(tool.version);
  if (name === undefined) throw usageError("", "No command was given.");
  if (name === "--help" || name === "-h" || name === "help") return io.out(help);
  const listed = Object.hasOwn(commands, name) ? commands[name] : undefined;
  if (!listed) throw usageError("", `There is no command "${name}".`);
  const command = await listed.load();
  if (rest.includes("--help") || rest.includes("-h")) return io.out(command.help);
  await command.run(rest, json, io);
}

// Whoever reads may stop reading (a pipe into head): no reason to stop, or to fail.
for (const stream of [process.stdout, process.stderr]) {
  stream.on("error", (error: NodeJS.ErrnoException) => {
    if (error.code !== "EPIPE") throw error;
  });
}

const args = process.argv.slice(2);
const json = args.includes("--json");
const now_s = () => performance.now() / 1000;
const io = (json ? machineIo : personIo)(process.stdout, process.stderr, now_s);
try {
  await run(args, json, io);
} catch (error) {
  if (json) process.stderr.write(`${errorJson(error)}\n`);
  else io.note(errorText(error));
  process.exitCode = error instanceof InputError ? 2 : 1;
}
