import { spawn, spawnSync } from "node:child_process";
import { existsSync, mkdirSync, readdirSync, rmSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { build } from "vite";

const path = (relative: string) => fileURLToPath(new URL(relative, import.meta.url));
/** A build of this process's own: tests that run at the same time must not empty each other's folder. */
const folder = path(`../../dist/cli-of-test-${process.pid}`);
const main = join(folder, "main.js");

/** Builds the command line as it is shipped. */
export async function buildCli(): Promise<void> {
  await build({ configFile: path("../../src/cli/vite.config.ts"), logLevel: "error", build: { outDir: folder } });
}

/** Removes what {@link buildCli} built. */
export const removeCli = (): void => rmSync(folder, { recursive: true, force: true });

/** What a run of the command line said and how it ended. */
export interface Ended {
  readonly code: number | null;
  readonly out: string;
  readonly err: string;
}

/** Runs the command line to its end. */
export function lodewake(...args: string[]): Ended {
  const { status, stdout, stderr } = spawnSync(process.execPath, [main, ...args], { encoding: "utf8" });
  return { code: status, out: stdout, err: stderr };
}

/** Starts the command line and stops it with Ctrl-C once `when` is true of its standard error. */
export function interrupted(args: string[], when: (err: string) => boolean): Promise<{ signal: string | null }> {
  const child = spawn(process.execPath, [main, ...args], { stdio: ["ignore", "ignore", "pipe"] });
  let err = "";
  child.stderr.setEncoding("utf8").on("data", (text: string) => {
    err += text;
    if (when(err)) child.kill("SIGINT");
  });
  return new Promise((resolve) => child.once("close", (_, signal) => resolve({ signal })));
}

/** Runs the command line for a reader who goes away at once, as `head` does. */
export function unread(...args: string[]): Promise<{ code: number | null; err: string }> {
  const child = spawn(process.execPath, [main, ...args], { stdio: ["ignore", "pipe", "pipe"] });
  child.stdout.destroy();
  let err = "";
  child.stderr.setEncoding("utf8").on("data", (text: string) => {
    err += text;
  });
  return new Promise((resolve) => child.once("close", (code) => resolve({ code, err })));
}

/** A trial folder with the given files: text, bytes, or nothing for an empty file. */
export function makeTrial(folder: string, files: Readonly<Record<string, string | Uint8Array>>): string {
  mkdirSync(folder, { recursive: true });
  for (const [name, content] of Object.entries(files)) writeFileSync(join(folder, name), content);
  return folder;
}

/** Names in a folder, hidden ones too; none when it isn't there. */
export const namesIn = (folder: string): string[] => (existsSync(folder) ? readdirSync(folder) : []);
