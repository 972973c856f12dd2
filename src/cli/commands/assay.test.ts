import { existsSync, mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { assayPresets } from "../../assay/index.ts";
import { openInNode } from "../../footage/node/index.ts";
import { InputError } from "../../quantities/index.ts";
import { readTrialFolder } from "../trial-folder.ts";
import { assay } from "./assay.ts";

const quick = ["--set", "picture.width_px=128", "--set", "picture.height_px=96", "--seconds", "0.5"];

let parent = "";
let lines: string[] = [];
beforeEach(() => {
  parent = mkdtempSync(join(tmpdir(), "assay-"));
  lines = [];
});
afterEach(() => rmSync(parent, { recursive: true, force: true }));

function run(...args: string[]): Promise<void> {
  return assay(args, { out: (text) => lines.push(text), progress: () => {} });
}

async function refusal(...args: string[]): Promise<InputError> {
  const error = await run(...args).then(
    () => null,
    (e: unknown) => e,
  );
  expect(error).toBeInstanceOf(InputError);
  return error as InputError;
}

function table(path: string): Record<string, string>[] {
  const [head = "", ...rows] = readFileSync(path, "utf8").trimEnd().split("\n");
  const names = head.split(",");
  return rows.map((row) => Object.fromEntries(row.split(",").map((value, i) => [names[i], value])));
}

describe("lodewake assay", () => {
  it("makes a trial folder that reads without a warning, truth beside it", async () => {
    const out = join(parent, "a", "trial");
    await run(
      "--out",
      out,
      "--preset",
      "variable-rate",
      "--seed",
      "7",
      "--strain",
      "AB-1",
      "--culture",
      "C3",
      ...quick,
    );
    expect(readdirSync(out).sort()).toEqual(["swim.mp4", "trial.json", "truth.csv", "truth.json"]);
    const { trial, recording, warnings } = await readTrialFolder(out);
    expect(warnings).toEqual([]);
    expect(trial).toMatchObject({ trial: "variable-rate-7", strain: "AB-1", culture: "C3", recording: "swim.mp4" });
    expect(recording).toBe(join(out, "swim.mp4"));
    const truth = JSON.parse(readFileSync(join(out, "truth.json"), "utf8"));
    expect(truth).toMatchObject({ schema: "lodewake/assay-truth@1", width_px: 128, height_px: 96 });
    expect(truth.settings.seed).toBe(7);

    const footage = await openInNode(recording, {});
    const times: number[] = [];
    await footage.read((frame) => {
      times.push(frame.t_s);
      return "more";
    });
    footage.close();
    expect(times.length).toBe(truth.frames);
    const rows = table(join(out, "truth.csv"));
    expect(rows.length).toBeGreaterThan(20);
    for (const row of rows) {
      expect(Math.abs(Number(row.t_s) - (times[Number(row.frame)] as number))).toBeLessThan(2e-6);
      expect(Number(row.x_px)).toBeGreaterThanOrEqual(-0.5);
      expect(Number(row.x_px)).toBeLessThan(127.5);
      expect(["0", "1"]).toContain(row.visible);
    }
    // No shake in this preset: micrometres are pixels times the scale, y up.
    const um = truth.settings.picture.um_per_px;
    const row = rows[0] as Record<string, string>;
    expect(Math.abs(Number(row.x_um) - um * Number(row.x_px))).toBeLessThan(0.011);
    expect(Math.abs(Number(row.y_um) + um * Number(row.y_px))).toBeLessThan(0.011);
  });

  it("makes the same bytes of every file when asked twice", async () => {
    const folders = ["one", "two"].map((name) => join(parent, name));
    for (const out of folders) await run("--out", out, "--preset", "demo", ...quick);
    const [one, two] = folders.map((out) => readdirSync(out).map((name) => [name, readFileSync(join(out, name))]));
    expect(one?.length).toBe(4);
    expect(two).toEqual(one);
  });

  it("says how slow motion was captured, in the trial and in the recording", async () => {
    const out = join(parent, "slow");
    await run("--out", out, "--preset", "slow-motion", ...quick);
    const { trial, recording } = await readTrialFolder(out);
    expect(trial.captureFps).toBe(120);
    const footage = await openInNode(recording, {});
    footage.close();
    expect(footage.facts.timeFactor).toBeCloseTo(0.25, 9);
  });

  it("turns the coded picture, and leaves the truth upright", async () => {
    const plain = join(parent, "plain");
    const turned = join(parent, "turned");
    await run("--out", plain, ...quick);
    await run("--out", turned, "--rotate", "270", "--container", "mov", ...quick);
    expect(readFileSync(join(turned, "truth.csv"))).toEqual(readFileSync(join(plain, "truth.csv")));
    const footage = await openInNode(join(turned, "swim.mov"), {});
    footage.close();
    expect(footage.facts).toMatchObject({ width: 128, height: 96, rotation_deg: 270 });
  });

  it("replaces an older one only when told to, and nothing else ever", async () => {
    const out = join(parent, "trial");
    await run("--out", out, ...quick);
    const before = readFileSync(join(out, "swim.mp4"));
    expect((await refusal("--out", out, "--seed", "2", ...quick)).code).toBe("output-exists");
    expect(readFileSync(join(out, "swim.mp4"))).toEqual(before);
    await run("--out", out, "--seed", "2", "--replace", ...quick);
    expect(readFileSync(join(out, "swim.mp4"))).not.toEqual(before);
    const mine = join(parent, "mine");
    mkdirSync(mine);
    writeFileSync(join(mine, "notes.txt"), "keep");
    await refusal("--out", mine, "--replace", ...quick);
    expect(readdirSync(mine)).toEqual(["notes.txt"]);
    expect(readdirSync(parent).sort()).toEqual(["mine", "trial"]);
  });

  it("lists every preset", async () => {
    await run("--list");
    expect(lines.length).toBe(Object.keys(assayPresets).length);
    for (const name of Object.keys(assayPresets)) expect(lines.some((line) => line.startsWith(`${name} `))).toBe(true);
  });

  it.each<[string, string[]]>([
    ["unknown preset", ["--preset", "no-such"]],
    ["name of an object's own", ["--preset", "toString"]],
    ["unknown option", ["--sed", "3"]],
    ["stray word", ["more"]],
    ["seed that is no number", ["--seed", "x"]],
    ["seed that is no whole number", ["--seed", "1.5"]],
    ["length that is no number", ["--seconds", "long"]],
    ["length of nothing", ["--seconds", "0"]],
    ["unknown setting", ["--set", "swimmers.sped=3"]],
    ["setting without a value", ["--set", "swimmers.cells"]],
    ["setting of the wrong kind", ["--set", "swimmers.cells=many"]],
    ["setting out of bounds", ["--set", "time.fps=0"]],
    ["unknown codec", ["--codec", "theora"]],
    ["container for another codec", ["--codec", "h264", "--container", "webm"]],
    ["rotation that is no quarter turn", ["--rotate", "45"]],
    ["rotation AVI can't hold", ["--codec", "mjpeg", "--rotate", "90"]],
    ["times AVI can't hold", ["--codec", "mjpeg", "--preset", "variable-rate"]],
    ["quality out of bounds", ["--quality", "99"]],
  ])("refuses: %s", async (_, args) => {
    const error = await refusal("--out", join(parent, "x"), ...args);
    expect(error.message.length).toBeGreaterThan(10);
    expect(error.remedy.length).toBeGreaterThan(5);
    expect(existsSync(join(parent, "x"))).toBe(false);
  });

  it("refuses without a folder to write to", async () => {
    expect((await refusal("--preset", "plain")).message).toContain("--out");
  });
});
