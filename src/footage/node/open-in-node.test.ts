import { existsSync, readFileSync, writeFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import {
  addEditList,
  ClipFolder,
  type ClipScene,
  cutFile,
  drawPicture,
  evenTimes,
  jitteredTimes,
  layOut,
  makeClip,
  makeSoundOnly,
} from "../../../tests/helpers/clips.ts";
import { fingerprint } from "../../../tests/helpers/fingerprint.ts";
import type { FootageFacts, FootageSettings, ReadReport } from "../footage.ts";
import { openInNode } from "./index.ts";

const folder = new ClipFolder();
const fixture = (name: string) => fileURLToPath(new URL(`../../../tests/fixtures/recordings/${name}`, import.meta.url));
const jittered: ClipScene = { width: 160, height: 120, times_s: jitteredTimes(50, 30), constantRate: false };

beforeAll(async () => {
  const path = (name: string) => folder.at(name);
  await makeClip(path("jittered.mp4"), jittered);
  await layOut(path("jittered.mp4"), path("index-first.mp4"), "in-memory");
  await layOut(path("jittered.mp4"), path("fragments.mp4"), "fragmented");
  await makeClip(
    path("turned.mov"),
    { width: 120, height: 162, times_s: evenTimes(12, 30), constantRate: true },
    { container: "mov", rotation: 90 },
  );
  await makeClip(
    path("repeats.mp4"),
    { ...jittered, times_s: evenTimes(40, 30), constantRate: true, shows: (i) => (i % 4 === 3 ? i - 1 : i) },
    { crf: 0, captureRateTag_hz: 240 },
  );
  await makeClip(
    path("frames.avi"),
    { ...jittered, times_s: evenTimes(30, 25), constantRate: true },
    { codec: "mjpeg", container: "avi", crf: 3 },
  );
}, 60_000);
afterAll(() => folder.remove());

interface Read {
  readonly facts: FootageFacts;
  readonly report: ReadReport;
  readonly times_s: number[];
  readonly fingerprints: number[];
  readonly pictures: Uint8Array[];
}

async function read(path: string, settings: FootageSettings = {}): Promise<Read> {
  const footage = await openInNode(path, settings);
  const times_s: number[] = [];
  const pictures: Uint8Array[] = [];
  const report = await footage.read((frame) => {
    expect(frame.index).toBe(times_s.length);
    expect(frame.luma.length).toBe(frame.width * frame.height);
    times_s.push(frame.t_s);
    pictures.push(frame.luma.slice());
    return "more";
  });
  footage.close();
  return { facts: footage.facts, report, times_s, pictures, fingerprints: pictures.map(fingerprint) };
}

/** Mean difference between read luma and what was drawn, grey levels; `limited` when the codec keeps 16 … 235. */
function meanDifference(luma: Uint8Array, shown: number, width: number, height: number, limited = true): number {
  const drawn = new Uint8Array(width * height);
  drawPicture(shown, width, height, drawn);
  let sum = 0;
  for (let i = 0; i < drawn.length; i++)
    sum += Math.abs(luma[i]! - (limited ? 16 + (219 * drawn[i]!) / 255 : drawn[i]!));
  return sum / drawn.length;
}

const native = await import("node-av").then(
  () => true,
  () => false,
);

describe("both decoders in Node", () => {
  const made = ["jittered.mp4", "index-first.mp4", "fragments.mp4", "turned.mov", "repeats.mp4"];
  const clips = [
    ...made.map((name) => ({ name, path: folder.at(name) })),
    ...["hevc-8bit-rot90.mov", "h264-10bit.mp4", "vp9.mp4"].map((name) => ({ name, path: fixture(name) })),
  ];
  it.runIf(native).each(clips)("give the same pictures and times of $name", async ({ path }) => {
    const [a, b] = [await read(path, { decoder: "native" }), await read(path, { decoder: "wasm" })];
    expect(a.facts.decoder).toMatch(/native/);
    expect(b.facts.decoder).toMatch(/wasm/);
    expect(b.times_s).toEqual(a.times_s);
    expect(b.fingerprints).toEqual(a.fingerprints);
    expect(new Set(a.fingerprints).size).toBe(a.fingerprints.length - a.report.repeatedFrames.length);
    expect(b.report).toEqual(a.report);
    expect({ ...b.facts, decoder: "" }).toEqual({ ...a.facts, decoder: "" });
  });

  it.runIf(native)("are chosen by what they can read: AV1 only natively", async () => {
    const { facts, report } = await read(fixture("av1.mkv"));
    expect(facts.decoder).toMatch(/native/);
    expect(report.framesRead).toBe(12);
  });
});

describe("frames and times", () => {
  it("are those that were recorded, B-frames and uneven times and all", async () => {
    const { times_s, pictures, facts, report } = await read(folder.at("jittered.mp4"), { decoder: "wasm" });
    expect(times_s).toHaveLength(50);
    times_s.forEach((t_s, i) => {
      expect(t_s).toBeCloseTo(jittered.times_s[i]!, 9);
    });
    pictures.forEach((luma, i) => {
      expect(meanDifference(luma, i, 160, 120)).toBeLessThan(3);
    });
    expect(facts).toMatchObject({ framesExpected: 50, timeFactor: 1, timeFactorFrom: "none", rotation_deg: 0 });
    expect(report).toEqual({ framesRead: 50, stoppedEarly: false, repeatedFrames: [], warnings: [] });
  });

  it("stand upright where a rotation tag says so", async () => {
    const { facts, pictures } = await read(folder.at("turned.mov"));
    expect(facts).toMatchObject({ width: 120, height: 162, rotation_deg: 90 });
    pictures.forEach((luma, i) => {
      expect(meanDifference(luma, i, 120, 162)).toBeLessThan(3);
    });
  });

  it("are cut to the edit list, and count from the first frame kept", async () => {
    const path = addEditList(folder.at("jittered.mp4"), folder.at("edited.mp4"), [{ start_s: 0.3, duration_s: 0.7 }]);
    const kept = jittered.times_s.flatMap((t_s, i) => (t_s >= 0.3 && t_s < 1 ? [i] : []));
    for (const decoder of ["auto", "wasm"] as const) {
      const { times_s, pictures } = await read(path, { decoder });
      expect(times_s).toHaveLength(kept.length);
      kept.forEach((frame, i) => {
        expect(times_s[i]).toBeCloseTo(jittered.times_s[frame]! - jittered.times_s[kept[0]!]!, 9);
        expect(meanDifference(pictures[i]!, frame, 160, 120)).toBeLessThan(3);
      });
    }
  });

  it("run at the capture rate that the recording's own tag states", async () => {
    const { times_s, facts } = await read(folder.at("repeats.mp4"));
    expect(facts).toMatchObject({ timeFactor: 1 / 8, timeFactorFrom: "recording tag" });
    expect(times_s.at(-1)).toBeCloseTo(39 / 240, 9);
    expect(facts.durationExpected_s).toBeCloseTo(40 / 240, 9);
  });

  it("run at the capture rate that the trial states, before any tag", async () => {
    const { times_s, facts } = await read(folder.at("repeats.mp4"), { captureFps: 120 });
    expect(facts).toMatchObject({ timeFactor: 1 / 4, timeFactorFrom: "trial" });
    expect(times_s.at(-1)).toBeCloseTo(39 / 120, 9);
  });

  it("are named where they repeat the one before", async () => {
    const { report } = await read(folder.at("repeats.mp4"));
    expect(report.repeatedFrames).toEqual([3, 7, 11, 15, 19, 23, 27, 31, 35, 39]);
    expect(report.warnings.map(({ code }) => code)).toEqual(["frames-repeated"]);
  });

  it("come from Motion JPEG in AVI in its full range", async () => {
    const { times_s, pictures, facts } = await read(folder.at("frames.avi"));
    expect(facts).toMatchObject({ container: "avi", codec: "mjpeg", framesExpected: 30 });
    times_s.forEach((t_s, i) => {
      expect(t_s).toBeCloseTo(i / 25, 9);
      expect(meanDifference(pictures[i]!, i, 160, 120, false)).toBeLessThan(4);
    });
  });

  it("deeper than 8 bits are rounded to 8", async () => {
    const { facts, pictures } = await read(fixture("h264-10bit.mp4"));
    expect(facts.bitDepth).toBe(10);
    pictures.forEach((luma, i) => {
      expect(meanDifference(luma, i, 160, 120)).toBeLessThan(3);
    });
  });

  it("can be read again, stopped early, and stopped by a signal", async () => {
    const footage = await openInNode(folder.at("jittered.mp4"), {});
    const first = await footage.read(({ index }) => (index === 4 ? "enough" : "more"));
    expect(first).toMatchObject({ framesRead: 5, stoppedEarly: true, warnings: [] });
    expect((await footage.read(() => "more")).framesRead).toBe(50);
    for (const decoder of ["auto", "wasm"] as const) {
      const again = await openInNode(folder.at("jittered.mp4"), { decoder });
      const signal = { aborted: false };
      const reading = again.read(({ index }) => {
        signal.aborted = index === 9;
        return "more";
      }, signal);
      await expect(reading).rejects.toMatchObject({ name: "Stopped" });
      // What the receiver throws is its own affair and comes through as it is.
      const own = new Error("the receiver's own");
      await expect(
        again.read(() => {
          throw own;
        }),
      ).rejects.toBe(own);
      expect((await again.read(() => "more")).framesRead).toBe(50);
      again.close();
      again.close();
    }
    footage.close();
  });
});

describe("what is cut off", () => {
  const codes = ({ report }: Read) => report.warnings.map(({ code }) => code);

  it.each(["auto", "wasm"] as const)("gives what can be decoded and says how much is lost (%s)", async (decoder) => {
    const path = cutFile(folder.at("index-first.mp4"), folder.at("cut.mp4"), 0.6);
    const cut = await read(path, { decoder });
    expect(cut.report.framesRead).toBeGreaterThan(20);
    expect(cut.report.framesRead).toBeLessThan(45);
    expect(codes(cut)).toEqual(["recording-cut-off"]);
    const end_s = cut.times_s.at(-1)!;
    const lost_s = Number(/([\d.]+) s of it are lost/.exec(cut.report.warnings[0]!.message)?.[1]);
    expect(end_s + lost_s).toBeGreaterThan(1.58);
    expect(end_s + lost_s).toBeLessThan(1.67);
    const whole = await read(folder.at("index-first.mp4"), { decoder });
    // The last picture before the cut may lack some of its data.
    const sure = cut.report.framesRead - 4;
    expect(cut.fingerprints.slice(0, sure)).toEqual(whole.fingerprints.slice(0, sure));
  });

  it("says so of an AVI file and of fragments too", async () => {
    expect(codes(await read(cutFile(folder.at("frames.avi"), folder.at("cut.avi"), 0.6)))).toEqual([
      "recording-cut-off",
    ]);
    const fragments = await read(cutFile(folder.at("fragments.mp4"), folder.at("cut-fragments.mp4"), 0.6));
    expect(codes(fragments)).toEqual(["recording-cut-off"]);
    expect(fragments.report.warnings[0]!.message).toMatch(/not known/);
  });

  it("is refused when the index is gone", async () => {
    const path = cutFile(folder.at("jittered.mp4"), folder.at("no-index.mp4"), 0.5);
    await expect(openInNode(path, {})).rejects.toMatchObject({ name: "InputError", code: "recording-cut-off" });
  });
});

describe("what is no recording", () => {
  const refusal = async (name: string, content: string | Buffer | null, settings: FootageSettings = {}) => {
    const path = folder.at(name);
    if (content !== null) writeFileSync(path, content);
    const error = await openInNode(path, settings).catch((caught: unknown) => caught);
    expect(error).toMatchObject({ name: "InputError", where: name });
    expect((error as { remedy: string }).remedy).toMatch(/\w+.*\.$/);
    return (error as { code: string }).code;
  };

  it("is refused with its own reason", async () => {
    expect(await refusal("absent.mp4", null)).toBe("recording-missing");
    expect(await refusal("empty.mp4", "")).toBe("recording-empty");
    expect(await refusal("text.mp4", "not a video, whatever its name says\n".repeat(40))).toBe("not-a-video");
    expect(existsSync(folder.at("absent.mp4"))).toBe(false);
  });

  it("is refused when there is sound only", async () => {
    await makeSoundOnly(folder.at("sound.mov"));
    expect(await refusal("sound.mov", null)).toBe("no-video-track");
  });

  it("is refused when no decoder knows the codec, or not the one asked for", async () => {
    const bytes = readFileSync(folder.at("jittered.mp4"));
    for (let at = bytes.indexOf("avc1"); at >= 0; at = bytes.indexOf("avc1", at + 4)) bytes.write("zzz9", at, "latin1");
    expect(await refusal("unknown-codec.mp4", bytes)).toBe("codec-not-supported");
    expect(await refusal("frames.avi", null, { decoder: "native" })).toBe("decoder-not-available");
  });
});
