import { mkdirSync, readFileSync, writeFileSync } from "node:fs";
import { strFromU8, unzipSync } from "fflate";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it, vi } from "vitest";
import { type BuiltApp, serveBuiltApp } from "../helpers/built-app.ts";
import { startChromium } from "../helpers/chromium.ts";
import { ClipFolder, evenTimes, makeClip } from "../helpers/clips.ts";
import {
  dropOnto,
  expectAccessible,
  frameLine,
  measure,
  openDemo,
  openWorkbench,
  textOf,
  type WorkbenchPage,
} from "../helpers/workbench-page.ts";

// A page has to be loaded, and workers started in it, on a machine that may be busy.
vi.setConfig({ testTimeout: 60_000 });

const resultNames = [
  "paths.csv",
  "cells.csv",
  "turns.csv",
  "front.csv",
  "summary.json",
  "report.html",
  "datapackage.json",
];
const files = new ClipFolder();
let app: BuiltApp;
let browser: Browser;
const pages: WorkbenchPage[] = [];

async function workbench(options: Parameters<typeof openWorkbench>[2] = {}): Promise<Page> {
  const opened = await openWorkbench(browser, app.url, options);
  pages.push(opened);
  return opened.page;
}

beforeAll(async () => {
  [app, browser] = await Promise.all([serveBuiltApp(), startChromium()]);
  mkdirSync(files.at("T9"));
  await makeClip(files.at("T9/swim.mp4"), { width: 160, height: 120, times_s: evenTimes(30, 30), constantRate: true });
  writeFileSync(
    files.at("T9/trial.json"),
    JSON.stringify({
      schema: "lodewake/trial@1",
      trial: "T9",
      recording: "swim.mp4",
      field: {
        steps: [
          { t_s: 0, magnitude_mT: 0.3, angle_deg: 0 },
          { t_s: 0.5, magnitude_mT: 0.3, angle_deg: 180 },
        ],
      },
    }),
  );
  writeFileSync(files.at("notes.mp4"), "this is no video\n".repeat(100));
}, 120_000);
afterAll(async () => {
  await browser?.close();
  await app?.close();
  files.remove();
});

describe("the page before anything is open", () => {
  it("is light: no worker, no WebAssembly, under 700 kB", async () => {
    const page = await workbench();
    const sizes = await page.evaluate(() =>
      performance.getEntriesByType("resource").map((it) => (it as PerformanceResourceTiming).decodedBodySize),
    );
    expect(sizes.length).toBeGreaterThan(1);
    expect(sizes.reduce((a, b) => a + b, 0)).toBeLessThan(700_000);
    expect(pages.at(-1)!.requests.filter((url) => /worker|wasm|demo/.test(url))).toEqual([]);
  });

  it("carries the policy that the server sends, less what only a header can say", async () => {
    const header = (await fetch(app.url)).headers.get("content-security-policy");
    const page = await workbench();
    const meta = await page.locator("meta[http-equiv='Content-Security-Policy']").getAttribute("content");
    expect(meta).toContain("connect-src 'self'");
    expect(header).toBe(`${meta}; frame-ancestors 'none'`);
  });

  for (const colorScheme of ["light", "dark"] as const) {
    it(`has no serious fault of accessibility in ${colorScheme} colours`, async () => {
      await expectAccessible(await workbench({ colorScheme }));
    });
  }
});

describe("the demo, measured", () => {
  let page: Page;
  let zip: Record<string, Uint8Array>;

  beforeAll(async () => {
    page = await workbench();
    await openDemo(page);
    await measure(page);
  }, 300_000);

  it("says its findings with intervals and n", async () => {
    const speed = page.locator(".finding").first();
    await expect
      .poll(() => textOf(speed))
      .toMatch(/^Cells swim at [\d.]+ µm\/s \(95 % between [\d.]+ and [\d.]+\)\s+\d+ motile cells/);
    expect(await page.locator(".field-lane").getAttribute("data-reversals")).toBe("2");
  });

  it("shows the evidence of a finding: its cells and no others are listed", async () => {
    const speed = page.locator(".finding").first();
    const n = Number(/(\d+) motile cells/.exec(await textOf(speed))![1]);
    const all = Number(await page.locator(".cells table").getAttribute("aria-rowcount")) - 1;
    expect(all).toBeGreaterThan(n);
    await speed.click();
    expect(await page.locator(".cells table").getAttribute("aria-rowcount")).toBe(String(n + 1));
    expect(await page.locator(".speed-swarm .dot").count()).toBe(n);
    await page.keyboard.press("Escape");
    expect(await page.locator(".cells table").getAttribute("aria-rowcount")).toBe(String(all + 1));
  });

  it("steps through the frames from the keyboard, and shows the very frame", async () => {
    await page.locator(".footage-stage").hover();
    await page.keyboard.press("Home");
    const steps = [
      ["ArrowRight", 1],
      ["Shift+ArrowRight", 11],
      ["ArrowLeft", 10],
      ["Shift+ArrowLeft", 0],
    ] as const;
    for (const [key, frame] of steps) {
      await page.keyboard.press(key);
      expect(await textOf(frameLine(page))).toContain(`frame ${frame + 1} of`);
      await page.locator(`canvas[data-frame='${frame}']`).waitFor();
    }
    await page.keyboard.press("End");
    const [, last, count] = /frame (\d+) of (\d+)/.exec(await textOf(frameLine(page)))!;
    expect(last).toBe(count);
    await page.locator(`canvas[data-frame='${Number(count) - 1}']`).waitFor();
  });

  it("plays at true speed and pauses", async () => {
    await page.locator(".footage-stage").click({ position: { x: 5, y: 5 } });
    await page.keyboard.press("Home");
    await page.keyboard.press("Space");
    await page.waitForTimeout(1500);
    await page.keyboard.press("Space");
    const t_s = Number((await textOf(frameLine(page).locator("b"))).trim());
    expect(t_s).toBeGreaterThan(1);
    expect(t_s).toBeLessThan(2.5);
    const stands = await textOf(frameLine(page));
    await page.waitForTimeout(300);
    expect(await textOf(frameLine(page))).toBe(stands);
  });

  it("goes through the footage by the ribbon", async () => {
    const slide = page.getByRole("slider", { name: "Time in the recording" });
    const box = (await slide.boundingBox())!;
    await page.mouse.click(box.x + box.width / 2, box.y + 40);
    const now = Number(await slide.getAttribute("aria-valuenow"));
    const end = Number(await slide.getAttribute("aria-valuemax"));
    expect(now / end).toBeGreaterThan(0.45);
    expect(now / end).toBeLessThan(0.55);
  });

  it("saves all result files in one zip", async () => {
    const [download] = await Promise.all([
      page.waitForEvent("download"),
      page.getByRole("button", { name: "Save results" }).click(),
    ]);
    expect(download.suggestedFilename()).toMatch(/^[\w-]+-result\.zip$/);
    zip = unzipSync(readFileSync(await download.path()));
    expect(Object.keys(zip)).toEqual(resultNames);
    const summary = JSON.parse(strFromU8(zip["summary.json"]!));
    expect(summary.schema).toBe("lodewake/summary@1");
    const said = await textOf(page.locator(".finding").first());
    expect(said).toContain(`${summary.speed.n_cells} motile cells`);
    expect(strFromU8(zip["report.html"]!)).toContain("<!doctype html>");
  });

  it("writes the same bytes into a folder, and never over an older result", async () => {
    // The browser's own dialog can't be driven; a folder that the page may write to stands in for the one picked.
    await page.evaluate(() => {
      Object.assign(window, { showDirectoryPicker: () => navigator.storage.getDirectory() });
    });
    for (const end of ["result.", "result-2."]) {
      await page.getByRole("button", { name: "Into a folder" }).click();
      await page.getByText(/^Saved in the folder/).waitFor();
      await expect.poll(() => textOf(page.locator(".said"))).toContain(end);
    }
    const written = await page.evaluate(async () => {
      const all: Record<string, Record<string, number[]>> = {};
      for await (const [name, handle] of await navigator.storage.getDirectory()) {
        all[name] = {};
        for await (const [file, entry] of handle as FileSystemDirectoryHandle) {
          const bytes = await (await (entry as FileSystemFileHandle).getFile()).arrayBuffer();
          all[name][file] = [...new Uint8Array(await crypto.subtle.digest("SHA-256", bytes))];
        }
      }
      return all;
    });
    expect(Object.keys(written)).toHaveLength(2);
    for (const folder of Object.values(written)) {
      expect(Object.keys(folder).sort()).toEqual([...resultNames].sort());
      for (const name of resultNames) {
        const digest = new Uint8Array(await crypto.subtle.digest("SHA-256", zip[name]! as BufferSource));
        expect(folder[name]).toEqual([...digest]);
      }
    }
  });

  it("finds the cell that is clicked on the footage, where the table says it is", async () => {
    await page.keyboard.press("Home");
    await page.locator("canvas[data-frame='0']").waitFor();
    const { source } = JSON.parse(strFromU8(zip["summary.json"]!));
    const box = (await page.locator(".footage-stage").boundingBox())!;
    const zoom = Math.min(box.width / source.width_px, box.height / source.height_px);
    const left = box.x + (box.width - source.width_px * zoom) / 2;
    const top = box.y + (box.height - source.height_px * zoom) / 2;
    const first = loneCell(strFromU8(zip["paths.csv"]!));
    await page.mouse.click(left + (first.x + 0.5) * zoom, top + (first.y + 0.5) * zoom);
    await page.locator(`[data-cell='${first.cell}'][aria-selected='true']`).waitFor();
    await page.mouse.click(left + 2, top + 2);
    await expect.poll(() => page.locator("[aria-selected='true'][data-cell]").count()).toBe(0);
  });

  it("has no serious fault of accessibility in light or dark colours, whichever tab is open", async () => {
    for (const colorScheme of ["light", "dark"] as const) {
      await page.emulateMedia({ colorScheme });
      for (const tab of ["Footage", "Scale", "Field", "Findings"]) {
        await page.getByRole("tab", { name: tab }).click();
        if (tab === "Findings") await page.locator(".finding").first().click();
        await expectAccessible(page);
      }
    }
  });

  it("keeps the results when something else can't be opened", async () => {
    await page.locator("input[data-opens='files']").setInputFiles(files.at("notes.mp4"));
    await page.getByRole("button", { name: "notes.mp4" }).click();
    await page.getByRole("alert").first().waitFor();
    await page.getByRole("navigation", { name: "Open trials" }).getByRole("button").first().click();
    await page.locator(".findings").waitFor();
  });
});

describe("opening", () => {
  it("takes a folder that is dropped", async () => {
    const page = await workbench();
    await dropOnto(page, [files.at("T9")]);
    await page.getByRole("heading", { name: "T9" }).waitFor();
    await page.locator("canvas[data-frame='0']").waitFor();
    expect(await textOf(frameLine(page))).toContain("frame 1 of 30");
    expect(await page.locator(".field-lane").getAttribute("data-reversals")).toBe("1");
  });

  it("takes a folder that is picked, and a recording alone beside it", async () => {
    const page = await workbench();
    await page.locator("input[data-opens='folder']").setInputFiles(files.at("T9"));
    await page.getByRole("heading", { name: "T9" }).waitFor();
    await page.locator("input[data-opens='files']").setInputFiles(files.at("T9/swim.mp4"));
    await page.getByRole("heading", { name: "swim.mp4" }).waitFor();
    expect(await page.getByRole("navigation", { name: "Open trials" }).getByRole("listitem").count()).toBe(2);
  });

  it("says of a file that is no video what is wrong and what to do", async () => {
    const page = await workbench();
    await page.locator("input[data-opens='files']").setInputFiles(files.at("notes.mp4"));
    await measure(page);
    const problem = page.locator(".problem");
    await expect.poll(() => textOf(problem)).toContain("notes.mp4 could not be measured");
    expect(await textOf(problem.locator(".place"))).toContain("notes.mp4");
    expect((await textOf(problem.locator(".remedy"))).length).toBeGreaterThan(10);
  });

  it("says of a folder without a recording what is wrong, and can be told to be quiet", async () => {
    mkdirSync(files.at("empty"), { recursive: true });
    writeFileSync(files.at("empty/readme.txt"), "nothing");
    const page = await workbench();
    await dropOnto(page, [files.at("empty")]);
    await expect.poll(() => textOf(page.locator(".problem"))).toContain("empty could not be opened");
    await page.getByRole("button", { name: "Dismiss: empty could not be opened" }).click();
    expect(await page.locator(".problem").count()).toBe(0);
  });
});

describe("measuring", () => {
  it("shows progress, stops at once, and can start again", async () => {
    const page = await workbench();
    await openDemo(page);
    await page.getByRole("button", { name: "Measure", exact: true }).click();
    await page.locator(".work-line progress[value]").waitFor({ timeout: 60_000 });
    await page.getByRole("button", { name: "Stop" }).click();
    await page.getByRole("button", { name: "Measure", exact: true }).waitFor({ timeout: 2000 });
    expect(await page.locator(".findings").count()).toBe(0);
    expect(await page.locator(".problem").count()).toBe(0);
    await page.getByRole("button", { name: "Measure", exact: true }).click();
    await page.locator(".work-line progress[value]").waitFor({ timeout: 60_000 });
  }, 150_000);

  it("goes by a scale that is stated on the page", async () => {
    const page = await workbench();
    await dropOnto(page, [files.at("T9")]);
    await page.getByRole("tab", { name: "Scale" }).click();
    await page.getByRole("spinbutton", { name: /^Scale/ }).fill("0.5");
    await page.getByRole("spinbutton", { name: /^Standard uncertainty/ }).fill("0.01");
    await page.getByRole("button", { name: "Use for the next measurement" }).click();
    await page.getByRole("button", { name: "Measure", exact: true }).click();
    await page.getByText("Measured with 0.500 ± 0.010 µm per pixel.").waitFor();
    await page.getByRole("spinbutton", { name: /^Scale/ }).fill("0.6");
    await page.getByRole("button", { name: "Use for the next measurement" }).click();
    await page.getByText("Scale or rate was changed since").waitFor();
  });

  it("says so when the worker breaks down, and keeps the trial", async () => {
    const page = await workbench();
    await dropOnto(page, [files.at("T9")]);
    await page.getByRole("heading", { name: "T9" }).waitFor();
    await page.route("**/measure.worker-*", (route) => route.abort());
    await page.getByRole("button", { name: "Measure", exact: true }).click();
    await expect.poll(() => textOf(page.locator(".problem"))).toContain("T9 could not be measured");
    expect(await textOf(page.locator(".problem"))).toContain("The worker broke down");
    await page.getByRole("button", { name: "Measure again" }).waitFor();
    // The aborted request is the one fault that this test made itself.
    pages.at(-1)!.faults.length = 0;
  });
});

describe("everything above", () => {
  it("asked nobody but its own origin, and broke no policy", () => {
    const requests = pages.flatMap((page) => page.requests);
    expect(requests.length).toBeGreaterThan(20);
    const { origin } = new URL(app.url);
    expect(requests.filter((url) => !url.startsWith(origin) && !url.startsWith(`blob:${origin}`))).toEqual([]);
    expect(pages.flatMap((page) => page.faults)).toEqual([]);
  });
});

/** The first point of a cell in frame 0 that has no other cell within 40 pixels. */
function loneCell(csv: string): { cell: string; x: number; y: number } {
  const [head, ...rows] = csv.trim().split("\n");
  const at = (name: string) => head!.split(",").indexOf(name);
  const points = rows
    .map((row) => row.split(","))
    .filter((row) => row[at("frame")] === "0")
    .map((row) => ({ cell: row[at("cell")]!, x: Number(row[at("x_px")]), y: Number(row[at("y_px")]) }));
  const alone = points.find((a) => points.every((b) => a === b || Math.hypot(a.x - b.x, a.y - b.y) > 40));
  if (!alone) throw new Error("no cell stands alone in the first frame");
  return alone;
}
