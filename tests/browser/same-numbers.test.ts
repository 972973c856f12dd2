import { execFileSync } from "node:child_process";
import { mkdtempSync, readFileSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { unzipSync } from "fflate";
import type { Browser } from "playwright-core";
import { build } from "vite";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { type BuiltApp, serveBuiltApp } from "../helpers/built-app.ts";
import { startChromium } from "../helpers/chromium.ts";
import { measure, openDemo, openWorkbench } from "../helpers/workbench-page.ts";

const path = (relative: string) => fileURLToPath(new URL(relative, import.meta.url));

type Files = Readonly<Record<string, Uint8Array>>;

let scratch: string;
let browser: Browser;
let app: BuiltApp;
let inBrowser: Files;
let native: Files;
let wasm: Files;

/** The demo as the command line measures it, with one of its decoders. */
function onCommandLine(decoder: "auto" | "wasm"): Files {
  const out = join(scratch, decoder);
  const main = path("../../dist/cli/main.js");
  execFileSync(process.execPath, [
    main,
    "measure",
    path("../../fixtures/demo-trial"),
    "--out",
    out,
    "--decoder",
    decoder,
  ]);
  return Object.fromEntries(
    ["paths.csv", "cells.csv", "summary.json", "datapackage.json"].map((name) => [name, readFileSync(join(out, name))]),
  );
}

const text = (files: Files, name: string) => new TextDecoder().decode(files[name]);

/** The summary as it stands in the file, but for the name of the decoder. */
function withoutDecoder(files: Files): string {
  const summary = text(files, "summary.json");
  const { decoder } = JSON.parse(summary).source;
  expect(summary.split(JSON.stringify(decoder))).toHaveLength(2);
  return summary.replace(JSON.stringify(decoder), '"decoder"');
}

beforeAll(async () => {
  scratch = mkdtempSync(join(tmpdir(), "same-numbers-"));
  await build({ configFile: path("../../src/cli/vite.config.ts"), logLevel: "error" });
  native = onCommandLine("auto");
  wasm = onCommandLine("wasm");
  app = await serveBuiltApp();
  browser = await startChromium();
  const { page } = await openWorkbench(browser, app.url);
  await openDemo(page);
  await measure(page);
  const [download] = await Promise.all([
    page.waitForEvent("download"),
    page.getByRole("button", { name: "Save results" }).click(),
  ]);
  inBrowser = unzipSync(readFileSync(await download.path()));
}, 600_000);

afterAll(async () => {
  await browser?.close();
  await app?.close();
  rmSync(scratch, { recursive: true, force: true });
});

describe("the demo measured in Chromium and on the command line", () => {
  it.each(["paths.csv", "cells.csv", "datapackage.json"])("gives the same bytes in %s", (name) => {
    expect(text(inBrowser, name).length).toBeGreaterThan(100);
    expect(text(inBrowser, name) === text(native, name)).toBe(true);
    expect(text(wasm, name) === text(native, name)).toBe(true);
  });

  it("gives the same summary but for the decoder's name", () => {
    expect(withoutDecoder(inBrowser)).toBe(withoutDecoder(native));
    expect(withoutDecoder(wasm)).toBe(withoutDecoder(native));
    expect(JSON.parse(text(inBrowser, "summary.json")).source.decoder).toMatch(/^webcodecs/i);
  });
});
