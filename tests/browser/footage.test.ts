import { fileURLToPath } from "node:url";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { FootageSettings } from "../../src/footage/index.ts";
import { openInNode } from "../../src/footage/node/index.ts";
import { type BuiltPage, servePage } from "../helpers/built-page.ts";
import { startChromium } from "../helpers/chromium.ts";
import { addEditList, ClipFolder, cutFile, evenTimes, jitteredTimes, layOut, makeClip } from "../helpers/clips.ts";
import { fingerprint } from "../helpers/fingerprint.ts";
import type { Outcome, Task } from "./footage-page/reader.worker.ts";

const folder = new ClipFolder();
const fixture = (name: string) => fileURLToPath(new URL(`../fixtures/recordings/${name}`, import.meta.url));
const said: string[] = [];
let served: BuiltPage;
let browser: Browser;
let page: Page;

beforeAll(async () => {
  const size = { width: 160, height: 120 };
  await makeClip(folder.at("jittered.mp4"), { ...size, times_s: jitteredTimes(50, 30), constantRate: false });
  await layOut(folder.at("jittered.mp4"), folder.at("index-first.mp4"), "in-memory");
  cutFile(folder.at("index-first.mp4"), folder.at("cut.mp4"), 0.6);
  cutFile(folder.at("jittered.mp4"), folder.at("no-index.mp4"), 0.5);
  addEditList(folder.at("jittered.mp4"), folder.at("edited.mp4"), [{ start_s: 0.3, duration_s: 0.7 }]);
  const even = { ...size, times_s: evenTimes(30, 25), constantRate: true };
  await makeClip(folder.at("turned.mov"), { ...even, width: 118, height: 160 }, { container: "mov", rotation: 270 });
  await makeClip(folder.at("frames.avi"), even, { codec: "mjpeg", container: "avi", crf: 3 });
  served = await servePage(fileURLToPath(new URL("footage-page", import.meta.url)));
  browser = await startChromium();
  page = await browser.newPage();
  page.on("console", (message) => said.push(message.text()));
  await page.goto(served.url);
}, 120_000);

afterAll(async () => {
  await browser?.close();
  served?.close();
  folder.remove();
});

async function inBrowser(path: string, task: Omit<Task, "file">): Promise<Outcome> {
  await page.setInputFiles("#recording", path);
  return page.evaluate((order) => window.run(order), task);
}

async function inNode(path: string, settings: FootageSettings) {
  const footage = await openInNode(path, settings);
  const times_s: number[] = [];
  const fingerprints: number[] = [];
  const report = await footage.read(({ t_s, luma }) => {
    times_s.push(t_s);
    fingerprints.push(fingerprint(luma));
    return "more";
  });
  footage.close();
  return { facts: footage.facts, report, times_s, fingerprints };
}

const made = (name: string) => ({ name, path: folder.at(name) });
const kept = (name: string) => ({ name, path: fixture(name) });
const readByBoth = [
  ...["jittered.mp4", "index-first.mp4", "edited.mp4", "turned.mov", "cut.mp4"].map(made),
  ...["h264-10bit.mp4", "vp9.mp4"].map(kept),
];

describe("a recording read in Chromium", () => {
  it.each(readByBoth)(
    "gives the pictures and times it gives in Node, with either decoder: $name",
    async ({ path }) => {
      const node = await inNode(path, { decoder: "wasm" });
      expect(node.times_s.length).toBeGreaterThan(10);
      for (const [decoder, name] of [
        ["native", /WebCodecs/],
        ["wasm", /wasm/],
      ] as const) {
        const here = await inBrowser(path, { decoder, look: null });
        expect(here.facts?.decoder).toMatch(name);
        expect(here.times_s).toEqual(node.times_s);
        expect(here.fingerprints).toEqual(node.fingerprints);
        expect({ ...here.facts, decoder: "" }).toEqual({ ...node.facts, decoder: "" });
        expect(here.report).toEqual(node.report);
      }
    },
    60_000,
  );

  it.each([made("frames.avi"), kept("hevc-8bit-rot90.mov")])(
    "is left to ffmpeg in WebAssembly where the browser can't: $name",
    async ({ path }) => {
      const node = await inNode(path, { decoder: "wasm" });
      const here = await inBrowser(path, { decoder: "auto", look: null });
      expect(here.facts?.decoder).toMatch(/wasm/);
      expect(here.times_s).toEqual(node.times_s);
      expect(here.fingerprints).toEqual(node.fingerprints);
    },
    30_000,
  );

  it("is refused as in Node", async () => {
    expect(await inBrowser(folder.at("no-index.mp4"), { decoder: "auto", look: null })).toMatchObject({
      refused: "recording-cut-off",
    });
    expect(await inBrowser(folder.at("frames.avi"), { decoder: "native", look: null })).toMatchObject({
      refused: "decoder-not-available",
    });
  });

  it("shows any frame in any order, as reading it does", async () => {
    const look = [0, 1, 2, 29, 28, 27, 10, 3, 29, 0];
    for (const [path, decoder] of [
      [folder.at("turned.mov"), "native"],
      [folder.at("turned.mov"), "wasm"],
      [folder.at("frames.avi"), "wasm"],
    ] as const) {
      const node = await inNode(path, { decoder: "wasm" });
      const here = await inBrowser(path, { decoder, look });
      expect(here.times_s).toEqual(look.map((index) => node.times_s[index]));
      expect(here.fingerprints).toEqual(look.map((index) => node.fingerprints[index]));
    }
  }, 30_000);

  it("leaves no frame open and asks nothing of other places", () => {
    expect(said.filter((text) => /garbage collected|Content Security Policy/i.test(text))).toEqual([]);
  });
});
