import { describe, expect, it } from "vitest";
import type { FolderFile } from "./folder-file.ts";
import { trialsIn } from "./trials-in.ts";

const at = (path: string, text = ""): FolderFile => ({ path, file: new File([text], path.split("/").at(-1)!) });
const described = (recording: string, more = {}) =>
  JSON.stringify({ schema: "lodewake/trial@1", recording, trial: "T07", ...more });

describe("trialsIn", () => {
  it("reads a trial folder", async () => {
    const { sources, problems } = await trialsIn([
      at("T07/swim.mp4"),
      at("T07/trial.json", described("swim.mp4", { scale: { um_per_px: 0.5, uncertainty_um_per_px: 0.001 } })),
      at("T07/notes.txt"),
    ]);
    expect(problems).toEqual([]);
    expect(sources).toHaveLength(1);
    expect(sources[0]).toMatchObject({ name: "T07", description: { trial: "T07", scale: { um_per_px: 0.5 } } });
    expect(sources[0]!.recording.name).toBe("swim.mp4");
  });

  it("takes a folder with one recording, and a file alone, without a description", async () => {
    const { sources } = await trialsIn([at("day 1/a.mov"), at("b.webm")]);
    expect(sources.map(({ name, description }) => [name, description.recording])).toEqual([
      ["b.webm", "b.webm"],
      ["day 1", "a.mov"],
    ]);
  });

  it("finds the trials below a folder that is none itself, in reading order", async () => {
    const { sources } = await trialsIn([
      at("strains/T10/a.mp4"),
      at("strains/T9/video/b.mp4"),
      at("strains/T9/trial.json", described("video/b.mp4")),
      at("strains/readme.txt"),
    ]);
    expect(sources.map((source) => source.name)).toEqual(["T9", "T10"]);
    expect(sources[0]!.recording.name).toBe("b.mp4");
  });

  it("says what is wrong with one folder and opens the other", async () => {
    const { sources, problems } = await trialsIn([
      at("good/a.mp4"),
      at("bad/trial.json", "{ nothing"),
      at("bad/a.mp4"),
      at("two/a.mp4"),
      at("two/b.mp4"),
    ]);
    expect(sources.map((source) => source.name)).toEqual(["good"]);
    expect(problems.map((problem) => problem.title)).toEqual(["bad could not be opened", "two could not be opened"]);
    expect(problems[0]!.where).toMatch(/^trial\.json: line 1/);
    expect(problems[1]!.remedy).toContain("trial.json");
  });

  it("refuses a folder with nothing to measure", async () => {
    const { sources, problems } = await trialsIn([at("empty/deep/readme.txt")]);
    expect(sources).toEqual([]);
    expect(problems[0]).toMatchObject({ title: "empty could not be opened", where: "empty" });
  });

  it("takes a recording and its trial.json picked together as one trial", async () => {
    const { sources } = await trialsIn([at("swim.mp4"), at("trial.json", described("swim.mp4"))]);
    expect(sources.map((source) => source.description.trial)).toEqual(["T07"]);
  });

  it("keeps what reading the description warned of", async () => {
    const { sources } = await trialsIn([at("T/a.mp4"), at("T/trial.json", described("a.mp4", { colour: "red" }))]);
    expect(sources[0]!.warnings[0]!.message).toContain("trial.json: colour");
  });
});
