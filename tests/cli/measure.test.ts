import { mkdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { planAssay } from "../../src/assay/index.ts";
import { encodeRecording } from "../../src/cli/encode/index.ts";
import { ClipFolder, evenTimes, makeClip } from "../helpers/clips.ts";
import { buildCli, type Ended, interrupted, lodewake, makeTrial, namesIn, removeCli, unread } from "./run-cli.ts";

const folder = new ClipFolder();
const at = (name: string) => folder.at(name);
const scale = { um_per_px: 0.5, uncertainty_um_per_px: 0.001 };
const names = ["cells.csv", "datapackage.json", "front.csv", "paths.csv", "report.html", "summary.json", "turns.csv"];
const summaryIn = (result: string) => JSON.parse(readFileSync(join(result, "summary.json"), "utf8"));

/** A small synthetic trial, really encoded. */
async function filmed(name: string, swimmers: number, dead: number): Promise<string> {
  mkdirSync(at(name));
  const assay = planAssay({
    seed: 3,
    picture: { width_px: 400, height_px: 300, um_per_px: 0.5 },
    time: { seconds: 3 },
    swimmers: { cells: swimmers },
    dead: { cells: dead },
    debris: { pieces: 4 },
  });
  const how = { codec: "h264", container: "mp4", crf: 18, preset: "fast", keyframeEvery: 60, rotation: 0 } as const;
  await encodeRecording(assay, at(`${name}/swim.mp4`), { ...how, captureRateTag_hz: null });
  const trial = { schema: "lodewake/trial@1", trial: name, recording: "swim.mp4", scale, lense: "old" };
  return makeTrial(at(name), { "trial.json": JSON.stringify(trial) });
}

let swimming: string;
let still: string;
let dead: string;
/** The measurement of the swimming ones that several tests look at; its result is in r1. */
let first: Ended;

beforeAll(async () => {
  await buildCli();
  swimming = await filmed("swimming", 14, 4);
  dead = await filmed("dead", 0, 12);
  still = at("still");
  mkdirSync(still);
  const scene = { width: 160, height: 120, times_s: evenTimes(45, 30), constantRate: true, shows: () => 0 };
  await makeClip(at("still/swim.mp4"), scene);
  first = lodewake("measure", swimming, "--out", at("r1"));
}, 300_000);
afterAll(() => {
  removeCli();
  folder.remove();
});

describe("lodewake measure", () => {
  it("writes the whole result and says what it found", () => {
    const { code, out, err } = first;
    expect(err).toContain("lense");
    expect(code).toBe(0);
    expect(out).toMatch(/^\d+ frames over 3\.00 s, \d+ paths\.\nSpeed [\d.]+ \(95 % interval [\d.]+ to [\d.]+\) µm\/s/);
    expect(namesIn(at("r1")).sort()).toEqual(names);
    const summary = summaryIn(at("r1"));
    expect(summary.schema).toBe("lodewake/summary@1");
    expect(summary.scale.um_per_px).toBe(0.5);
    expect([summary.alignment, summary.turns, summary.rotation, summary.front]).toEqual([null, null, null, null]);
    expect(summary.warnings.map((w: { code: string }) => w.code)).toContain("trial-unknown-name");
    expect(summary.source.sha256).toMatch(/^[0-9a-f]{64}$/);
    expect(JSON.stringify(summary)).not.toContain(folder.path);
    const header = (name: string) => readFileSync(join(at("r1"), name), "utf8").split(/\r?\n/)[0];
    expect(header("paths.csv")).toMatch(/^cell,frame,t_s,x_px,y_px,x_um,y_um\b/);
    expect(header("cells.csv")).toMatch(
      /^cell,first_t_s,last_t_s,frames,motile,speed_um_s,speed_se_um_s,straightness,mean_cos,polarity,kept,reason\b/,
    );
  });

  it("replaces a result only when asked to, and whole", () => {
    lodewake("measure", dead, "--out", at("r2"));
    const refused = lodewake("measure", swimming, "--out", at("r2"));
    expect([refused.code, refused.err]).toEqual([2, expect.stringContaining("--replace")]);
    expect(summaryIn(at("r2")).trial).toBe("dead");
    expect(lodewake("measure", still, "--out", at("r2"), "--replace").code).toBe(0);
    expect(summaryIn(at("r2"))).toMatchObject({ trial: null, source: { frames: 45 } });
    expect(namesIn(at("r2")).sort()).toEqual(names);
    expect(namesIn(folder.path).filter((name) => name.startsWith("."))).toEqual([]);
  });

  it("gives the same bytes again, and the same numbers with the other decoder", () => {
    lodewake("measure", swimming, "--out", at("again"));
    lodewake("measure", swimming, "--out", at("wasm"), "--decoder", "wasm");
    for (const name of names) expect(readFileSync(join(at("again"), name))).toEqual(readFileSync(join(at("r1"), name)));
    expect(readFileSync(join(at("wasm"), "paths.csv"))).toEqual(readFileSync(join(at("r1"), "paths.csv")));
  });

  it("measures a clip in which nothing swims: no motile cell, said plainly", () => {
    const { code, out, err } = lodewake("measure", dead, "--out", at("r3"));
    expect(code).toBe(0);
    expect(out).toContain("No motile cell.");
    expect(err).toContain("No motile cell");
    const { speed } = summaryIn(at("r3"));
    expect([speed.n_cells, speed.mean_um_s, speed.ci95_um_s, speed.motile_fraction]).toEqual([0, null, null, 0]);
  });

  it("measures a still scene", () => {
    const { code, out, err } = lodewake("measure", still, "--out", at("r4"));
    expect(code).toBe(0);
    expect(out).toContain("No motile cell: none was followed long enough to tell.");
    expect(err).toMatch(/no scale/i);
    expect(summaryIn(at("r4")).speed.n_cells).toBe(0);
  });

  it("speaks JSON to machines", () => {
    const { code, out, err } = lodewake("measure", swimming, "--out", at("r5"), "--json");
    expect(code).toBe(0);
    expect(JSON.parse(out)).toEqual(summaryIn(at("r5")));
    const lines = err
      .trim()
      .split("\n")
      .map((line) => JSON.parse(line));
    expect(lines.some(({ progress }) => progress?.stage === "finding cells" && progress.total === 90)).toBe(true);
    const refused = lodewake("measure", at("nowhere"), "--out", at("r6"), "--json");
    expect(refused.code).toBe(2);
    const { error } = JSON.parse(refused.err.trim().split("\n").at(-1) as string);
    expect(Object.keys(error)).toEqual(["code", "what", "where", "remedy"]);
  });

  it("leaves nothing behind when it is stopped", async () => {
    const { signal } = await interrupted(["measure", swimming, "--out", at("r7"), "--json"], (err) =>
      /learning/.test(err),
    );
    expect(signal).toBe("SIGINT");
    expect(namesIn(folder.path).filter((name) => name.includes("r7"))).toEqual([]);
  });

  it("leaves the older result as it was when it is stopped", async () => {
    expect(lodewake("measure", still, "--out", at("r8")).code).toBe(0);
    const before = names.map((name) => readFileSync(join(at("r8"), name)));
    const args = ["measure", swimming, "--out", at("r8"), "--replace", "--json"];
    const { signal } = await interrupted(args, (err) => /finding cells/.test(err));
    expect(signal).toBe("SIGINT");
    expect(names.map((name) => readFileSync(join(at("r8"), name)))).toEqual(before);
    expect(namesIn(folder.path).filter((name) => name.includes("r8"))).toEqual(["r8"]);
  });

  it("writes the result though nobody reads what it says", async () => {
    expect(await unread("measure", still, "--out", at("r9"))).toEqual({
      code: 0,
      err: expect.stringContaining("Note:"),
    });
    expect(namesIn(at("r9")).sort()).toEqual(names);
  });
});

describe("help", () => {
  it("is there for the tool and each command", () => {
    const { code, out } = lodewake("--help");
    expect(code).toBe(0);
    for (const command of ["measure", "assay", "workbench"]) {
      expect(out).toContain(command);
      expect(lodewake(command, "--help").out).toContain(`lodewake ${command}`);
    }
    expect(lodewake("--version").out).toMatch(/^\d+\.\d+\.\d+\n$/);
  });
});
