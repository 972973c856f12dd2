import { existsSync, mkdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { ClipFolder, cutFile, evenTimes, layOut, makeClip, makeSoundOnly } from "../helpers/clips.ts";
import { buildCli, type Ended, lodewake, makeTrial, namesIn, removeCli } from "./run-cli.ts";

const clips = new ClipFolder();
const at = (name: string) => clips.at(name);
const schema = "lodewake/trial@1";
let clip: Buffer;
let atFront: Buffer;

beforeAll(async () => {
  await buildCli();
  const scene = { width: 160, height: 120, times_s: evenTimes(60, 30), constantRate: true };
  clip = readFileSync(await makeClip(at("whole.mp4"), scene));
  atFront = readFileSync(await layOut(at("whole.mp4"), at("front.mp4"), "in-memory"));
}, 240_000);
afterAll(() => {
  removeCli();
  clips.remove();
});

/** Refused as wrong, with a message that says what, where and what to do; nothing was written. */
function expectRefused({ code, out, err }: Ended, what: RegExp, result: string): void {
  expect(err).toMatch(what);
  expect(err).toMatch(/\n {2}where: .+\n {2}what to do: .+/);
  expect(code).toBe(2);
  expect(out).toBe("");
  expect(existsSync(result)).toBe(false);
  expect(namesIn(clips.path).filter((name) => name.startsWith("."))).toEqual([]);
}

const trial = (fields: object, name = "swim.mp4") => JSON.stringify({ schema, recording: name, ...fields });

describe("a trial that can't be measured is refused", () => {
  it.each<[string, () => Record<string, string | Uint8Array>, RegExp]>([
    ["no recording", () => ({ "notes.txt": "x" }), /neither a trial\.json nor a recording/],
    ["two recordings and no trial.json", () => ({ "a.mp4": clip, "b.mp4": clip }), /2 recordings/],
    ["trial.json is no JSON", () => ({ "swim.mp4": clip, "trial.json": '{ "schema": ' }), /not valid JSON/],
    [
      "wrong schema",
      () => ({ "swim.mp4": clip, "trial.json": '{ "schema": "other@3" }' }),
      /schema is the text "other@3"/,
    ],
    ["a later schema", () => ({ "swim.mp4": clip, "trial.json": '{ "schema": "lodewake/trial@7" }' }), /version/],
    ["wrong type", () => ({ "swim.mp4": clip, "trial.json": trial({ scale: "big" }) }), /scale/],
    ["negative scale", () => ({ "swim.mp4": clip, "trial.json": trial({ scale: { um_per_px: -0.4 } }) }), /um_per_px/],
    ["a path that leaves the folder", () => ({ "trial.json": trial({}, "../whole.mp4") }), /inside the trial folder/],
    ["a recording that isn't there", () => ({ "swim.mp4": clip, "trial.json": trial({}, "swum.mp4") }), /swum\.mp4/],
    ["a recording that is no video", () => ({ "swim.mp4": "I am a text.\n".repeat(50) }), /video/],
    ["an empty recording", () => ({ "swim.mp4": "" }), /empty/],
    [
      "a recording cut off before its index",
      () => ({ "swim.mp4": clip.subarray(0, clip.length / 2) }),
      /cut off before/,
    ],
    ["a codec nobody can decode", () => ({ "swim.mp4": withCodec(clip, "zz99") }), /zz99|codec|decode/],
  ])("%s", (name, files, what) => {
    const folder = makeTrial(at(`trial ${name}`), files());
    const result = at("result");
    const before = namesIn(folder);
    const ended = lodewake("measure", folder, "--out", result);
    expectRefused(ended, what, result);
    expect(ended.err).toContain(folder);
    expect(namesIn(folder)).toEqual(before);
  });

  it("a folder that isn't there, and a file in its place", () => {
    expectRefused(lodewake("measure", at("nowhere"), "--out", at("r")), /no such folder/i, at("r"));
    expectRefused(lodewake("measure", at("whole.mp4"), "--out", at("r")), /a file, not a trial folder/, at("r"));
  });

  it("sound only", async () => {
    mkdirSync(at("sound"));
    await makeSoundOnly(at("sound/swim.mov"));
    expectRefused(lodewake("measure", at("sound"), "--out", at("r")), /no video track/, at("r"));
  });

  it("one frame", async () => {
    mkdirSync(at("one"));
    await makeClip(at("one/swim.mp4"), { width: 160, height: 120, times_s: [0], constantRate: true });
    const ended = lodewake("measure", at("one"), "--out", at("r"));
    expectRefused(ended, /one frame/, at("r"));
    expect(ended.err).toContain(`where: ${at("one/swim.mp4")}`);
  });
});

describe("a place that can't be written to is refused before anything is measured", () => {
  let folder: string;
  beforeAll(() => {
    folder = makeTrial(at("good"), { "swim.mp4": clip });
  });

  it("a file in its place, or above it", () => {
    writeFileSync(at("file"), "mine");
    const inPlace = lodewake("measure", folder, "--out", at("file"));
    expect([inPlace.code, inPlace.err]).toEqual([2, expect.stringContaining("a file where the result folder")]);
    const above = lodewake("measure", folder, "--out", at("file/result"));
    expect([above.code, above.err]).toEqual([2, expect.stringContaining("can't be written")]);
    expect(readFileSync(at("file"), "utf8")).toBe("mine");
  });

  it("a folder whose summary is another program's stays as it is, even with --replace", () => {
    const other = makeTrial(at("other"), { "summary.json": '{ "schema": "other@1" }', "chapter.txt": "one" });
    const { code, err } = lodewake("measure", folder, "--out", other, "--replace");
    expect([code, err]).toEqual([2, expect.stringContaining("will not be touched")]);
    expect(namesIn(other).sort()).toEqual(["chapter.txt", "summary.json"]);
  });

  it("the trial's own folder stays as it is", () => {
    const { code, err } = lodewake("measure", folder, "--out", folder, "--replace");
    expect([code, err]).toEqual([2, expect.stringContaining("will not be touched")]);
    expect(namesIn(folder)).toEqual(["swim.mp4"]);
  });

  it("a folder that is no result stays as it is, even with --replace", () => {
    const other = makeTrial(at("thesis"), { "chapter.txt": "one" });
    const { code, err } = lodewake("measure", folder, "--out", other, "--replace");
    expect(code).toBe(2);
    expect(err).toContain("will not be touched");
    expect(namesIn(other)).toEqual(["chapter.txt"]);
  });
});

describe("a request that can't be understood", () => {
  it.each([
    [[], /No command/],
    [["measur"], /no command "measur"/],
    [["measure"], /No trial folder/],
    [["measure", "", "--out", "c"], /No trial folder/],
    [["measure", "a", "b", "--out", "c"], /More than one/],
    [["measure", "a"], /--out/],
    [["measure", "a", "--out", "b", "--fast"], /--fast/],
    [["measure", "a", "--out", "b", "--decoder", "best"], /auto, native or wasm/],
    [["workbench", "--port", "high"], /--port/],
    [["assay"], /--out/],
    [["assay", "--out", "b", "--fast"], /--fast/],
  ])("lodewake %j", (args, what) => {
    const { code, err, out } = lodewake(...args);
    expect([code, out]).toEqual([2, ""]);
    expect(err).toMatch(what);
    expect(err).toContain("--help");
  });
});

describe("a recording that is only partly there", () => {
  it("is measured as far as it goes, with the time lost", () => {
    writeFileSync(at("front-whole.mp4"), atFront);
    mkdirSync(at("cut"));
    cutFile(at("front-whole.mp4"), at("cut/swim.mp4"), 0.6);
    const { code, err } = lodewake("measure", at("cut"), "--out", at("cut-result"));
    expect(code).toBe(0);
    expect(err).toMatch(/\d(\.\d+)? s/);
    const { warnings, source } = JSON.parse(readFileSync(join(at("cut-result"), "summary.json"), "utf8"));
    expect(warnings.map((w: { code: string }) => w.code)).toContain("recording-cut-off");
    expect(source.frames).toBeLessThan(60);
    expect(source.frames).toBeGreaterThan(10);
  });
});

/** The clip with another codec's name in its sample description. */
function withCodec(bytes: Uint8Array, name: string): Uint8Array {
  const copy = Buffer.from(bytes);
  const stsd = copy.indexOf("stsd", 0, "latin1");
  copy.write(name, copy.indexOf("avc1", stsd, "latin1"), 4, "latin1");
  return copy;
}
