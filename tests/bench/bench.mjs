// Times decoding alone and the whole measurement of one clip, in turn, in Node and in Chromium.
// `npm run bench` makes a 720p clip of its own; `npm run bench -- CLIP` takes another.
import { execFileSync } from "node:child_process";
import { existsSync, readFileSync, statSync } from "node:fs";
import { cpus } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { chromium } from "playwright-core";
import { build } from "vite";

const root = fileURLToPath(new URL("../..", import.meta.url));
const rounds = 3;

const clip = process.argv[2] ?? (await ownClip());
console.log(`${clip}: ${(statSync(clip).size / 1e6).toFixed(1)} MB, on ${cpus().length} × ${cpus()[0]?.model.trim()}`);
report("Node", await inNode());
report("Chromium", await inChromium());

async function ownClip() {
  const folder = join(root, ".cache", "bench-trial");
  const made = join(folder, "swim.mp4");
  if (existsSync(made)) return made;
  console.log("Making a clip: 20 s of 1280 × 720 with grain (this takes a few minutes, once).");
  await build({ configFile: join(root, "src/cli/vite.config.ts"), logLevel: "error" });
  const options = ["--preset", "plain", "--set", "time.seconds=20", "--quality", "14", "--out", folder, "--replace"];
  execFileSync(process.execPath, [join(root, "dist/cli/main.js"), "assay", ...options], { stdio: "inherit" });
  return made;
}

async function inNode() {
  const outDir = join(root, ".cache", "bench-node");
  await build({
    root,
    configFile: false,
    logLevel: "error",
    build: { ssr: join(root, "tests/bench/node-side.ts"), outDir, emptyOutDir: true, target: "node20" },
  });
  const run = (what) =>
    JSON.parse(execFileSync(process.execPath, [join(outDir, "node-side.js"), what, clip]).toString());
  return inTurn(run);
}

async function inChromium() {
  const outDir = join(root, ".cache", "bench-page");
  const page = join(root, "tests/bench/page");
  const built = { outDir, emptyOutDir: true, target: "es2023" };
  await build({ root: page, base: "./", configFile: false, logLevel: "error", worker: { format: "es" }, build: built });
  const { preview } = await import("vite");
  const server = await preview({
    root: page,
    configFile: false,
    logLevel: "error",
    build: built,
    preview: { port: 0 },
  });
  const browser = await chromium.launch({
    executablePath: process.env.CHROMIUM ?? "/usr/bin/chromium",
    args: ["--no-sandbox", "--disable-gpu", "--disable-background-networking"],
  });
  const run = async (what) => {
    const context = await browser.newContext();
    const tab = await context.newPage();
    await tab.goto(server.resolvedUrls.local[0]);
    await tab.setInputFiles("input", clip);
    const timed = await tab.evaluate((w) => window.bench(w), what);
    const peak_MB = await largestProcess(browser);
    await context.close();
    return { ...timed, peak_MB };
  };
  const runs = await inTurn(run);
  await browser.close();
  await server.close();
  return runs;
}

/** Peak memory of the largest process of a browser, MB; null where the system doesn't tell. */
async function largestProcess(browser) {
  const session = await browser.newBrowserCDPSession();
  const { processInfo } = await session.send("SystemInfo.getProcessInfo");
  const peaks = processInfo
    .filter(({ type }) => type === "renderer")
    .map(({ id }) => `/proc/${id}/status`)
    .filter(existsSync)
    .map((path) => Number(/VmHWM:\s+(\d+)/.exec(readFileSync(path, "utf8"))?.[1] ?? 0) / 1024);
  return peaks.length > 0 ? Math.max(...peaks) : null;
}

async function inTurn(run) {
  const runs = { decode: [], measure: [] };
  for (let round = 0; round < rounds; round++) {
    for (const what of ["decode", "measure"]) runs[what].push(await run(what));
  }
  return runs;
}

function report(where, { decode, measure }) {
  const middle = (runs) => runs.map((r) => r.seconds).sort((a, b) => a - b)[runs.length >> 1];
  const { frames } = measure[0];
  const line = (name, runs) => {
    const peak = Math.max(...runs.map((r) => r.peak_MB ?? 0));
    const rate = (frames / middle(runs)).toFixed(1);
    console.log(
      `  ${name.padEnd(18)}${middle(runs).toFixed(2).padStart(8)} s${rate.padStart(9)} frames/s  peak ${peak.toFixed(0)} MB`,
    );
  };
  console.log(`${where}, ${frames} frames, median of ${rounds}:`);
  line("decoding alone", decode);
  line("whole measurement", measure);
  console.log(`  ratio ${(middle(measure) / middle(decode)).toFixed(2)}`);
}
