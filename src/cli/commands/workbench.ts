import { spawn } from "node:child_process";
import { fileURLToPath } from "node:url";
import { readArguments, usageError } from "../arguments.ts";
import type { Io } from "../io.ts";
import { serveWorkbench } from "../serve.ts";

export const help = `lodewake workbench [--port N] [--results RESULT] [--open]

Serves the workbench to this computer's own browser until it is stopped with Ctrl-C. Nothing leaves the computer.

  --port N            port to listen on; any free one when left out
  --results RESULT    also serve this result folder, its report at /results/
  --open              open it in the computer's usual browser`;

/** Asks the system for its usual browser. Where there is none the address has been printed. */
function openInBrowser(url: string): void {
  const opener = process.platform === "darwin" ? "open" : "xdg-open";
  spawn(opener, [url], { stdio: "ignore", detached: true })
    .on("error", () => {})
    .unref();
}

/** Runs `lodewake workbench`: resolves when it is stopped. @throws InputError when the request is wrong */
export async function workbench(args: readonly string[], io: Io): Promise<void> {
  const { values, positionals } = readArguments("workbench", args, {
    port: { type: "string" },
    results: { type: "string" },
    open: { type: "boolean", default: false },
    json: { type: "boolean" },
  });
  if (positionals.length > 0) throw usageError("workbench", `It takes no "${positionals[0]}".`);
  const port = values.port === undefined ? undefined : Number(values.port);
  if (port !== undefined && !(Number.isInteger(port) && port >= 0 && port < 65536)) {
    throw usageError("workbench", `--port is "${values.port}", but must be a whole number from 0 to 65535.`);
  }
  const root = fileURLToPath(new URL("../app", import.meta.url));
  const server = await serveWorkbench(root, {
    ...(port === undefined ? {} : { port }),
    ...(values.results === undefined ? {} : { results: values.results }),
  });
  io.out(`Workbench: ${server.url}`);
  if (values.results !== undefined) io.out(`Report: ${server.url}results/`);
  io.note("Stop it with Ctrl-C.");
  if (values.open)
    for (const path of values.results === undefined ? [""] : ["", "results/"]) openInBrowser(server.url + path);
  await new Promise<void>((stopped) => {
    for (const signal of ["SIGINT", "SIGTERM"] as const) process.once(signal, () => stopped());
  });
  await server.close();
}
