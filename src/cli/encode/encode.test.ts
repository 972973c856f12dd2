import { createHash } from "node:crypto";
import { mkdtempSync, readdirSync, readFileSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { openInNode } from "../../footage/node/index.ts";
import type { Frame } from "../../quantities/index.ts";
import { type EncodeOptions, encodeRecording, type Pictures, type Rotation } from "./index.ts";

/** HEVC, VP9 and AV1 need the optional codec library. */
const native = await import("node-av").then(
  () => true,
  () => false,
);
const made = (options: Partial<EncodeOptions>) => native || options.codec === "h264" || options.codec === "mjpeg";

const width = 96;
const height = 64;
const defaults: EncodeOptions = {
  codec: "h264",
  container: "mp4",
  crf: 12,
  preset: "veryfast",
  keyframeEvery: 10,
  rotation: 0,
  captureRateTag_hz: null,
};

/** A slanted ground with a bright bar that moves: no two pictures alike, and none like itself turned. */
function draw(frame: number, out: Uint8Array): void {
  for (let y = 0, k = 0; y < height; y++) {
    for (let x = 0; x < width; x++, k++) {
      const bar = Math.abs(x - 10 - 3 * frame) < 4 && y < 40 ? 90 : 0;
      out[k] = 40 + x / 2 + y + bar;
    }
  }
}

function pictures(times_s: readonly number[], constantRate: boolean): Pictures {
  const containerTimes_s = Float64Array.from(times_s);
  return { frames: times_s.length, width, height, containerTimes_s, constantRate, render: draw };
}

const even = pictures(
  Array.from({ length: 24 }, (_, i) => i / 30),
  true,
);
const uneven = pictures(
  Array.from({ length: 24 }, (_, i) => (33 * i + ((i * 7919) % 13)) / 1000),
  false,
);

describe("recordings", () => {
  let folder = "";
  beforeAll(() => {
    folder = mkdtempSync(join(tmpdir(), "encode-"));
  });
  afterAll(() => rmSync(folder, { recursive: true, force: true }));

  async function encode(name: string, made: Pictures, options: Partial<EncodeOptions>): Promise<string> {
    const path = join(folder, name);
    await encodeRecording(made, path, { ...defaults, ...options });
    return path;
  }

  /** What decoding says: times, and each picture's root-mean-square error against the one drawn. */
  async function readBack(path: string) {
    const footage = await openInNode(path, {});
    const wanted = new Uint8Array(width * height);
    const times_s: number[] = [];
    const errors: number[] = [];
    try {
      const full = footage.facts.container === "avi";
      await footage.read((frame: Frame) => {
        expect([frame.width, frame.height]).toEqual([width, height]);
        draw(times_s.length, wanted);
        let sum = 0;
        for (let k = 0; k < wanted.length; k++) {
          const level = full ? (wanted[k] as number) : 16 + (219 * (wanted[k] as number)) / 255;
          sum += ((frame.luma[k] as number) - level) ** 2;
        }
        times_s.push(frame.t_s);
        errors.push(Math.sqrt(sum / wanted.length));
        return "more";
      });
      return { facts: footage.facts, times_s, worst: Math.max(...errors) };
    } finally {
      footage.close();
    }
  }

  const timed: Partial<EncodeOptions>[] = [
    { codec: "h264", container: "mp4" },
    { codec: "h264", container: "mov" },
    { codec: "hevc", container: "mov" },
    { codec: "hevc", container: "mp4" },
    { codec: "vp9", container: "webm" },
    { codec: "vp9", container: "mp4" },
    { codec: "av1", container: "mp4" },
    { codec: "av1", container: "webm" },
  ];
  it.each(timed.filter(made))("show every picture at its own uneven time: $codec in $container", async (options) => {
    const { times_s, worst } = await readBack(
      await encode(`uneven-${options.codec}.${options.container}`, uneven, options),
    );
    expect(times_s.length).toBe(24);
    times_s.forEach((t, i) => {
      expect(Math.abs(t - (uneven.containerTimes_s[i] as number))).toBeLessThan(1e-6);
    });
    expect(worst).toBeLessThan(4);
  });

  it("keep an even rate exactly, B-frames and all", async () => {
    const { times_s, worst } = await readBack(await encode("even.mp4", even, { preset: "medium" }));
    expect(times_s).toEqual(Array.from({ length: 24 }, (_, i) => expect.closeTo(i / 30, 12)));
    expect(worst).toBeLessThan(4);
  });

  it("are Motion JPEG in AVI, in full range", async () => {
    const { times_s, worst } = await readBack(
      await encode("even.avi", even, { codec: "mjpeg", container: "avi", crf: 2 }),
    );
    expect(times_s.length).toBe(24);
    expect(times_s[23]).toBeCloseTo(23 / 30, 4);
    expect(worst).toBeLessThan(4);
  });

  it.each<[Rotation, "mp4" | "mov"]>([
    [90, "mp4"],
    [180, "mov"],
    [270, "mp4"],
  ])("stand upright when coded under a tag of %d° in %s", async (rotation, container) => {
    const { facts, worst } = await readBack(
      await encode(`turned-${rotation}.${container}`, even, { rotation, container }),
    );
    expect(facts.rotation_deg).toBe(rotation);
    expect(worst).toBeLessThan(4);
  });

  it("carry the capture rate of slow motion in their own tag", async () => {
    const { facts } = await readBack(await encode("slow.mp4", even, { captureRateTag_hz: 120 }));
    expect(facts.timeFactorFrom).toBe("recording tag");
    expect(facts.timeFactor).toBeCloseTo(0.25, 9);
  });

  const every: Partial<EncodeOptions>[] = [
    { codec: "h264", container: "mp4" },
    { codec: "hevc", container: "mov" },
    { codec: "vp9", container: "webm" },
    { codec: "mjpeg", container: "avi" },
  ];
  it.each(every.filter(made))("are the same bytes every time: $codec", async (options) => {
    const digests: string[] = [];
    for (const name of ["once", "again"]) {
      const path = await encode(`${name}.${options.container}`, even, options);
      digests.push(createHash("sha256").update(readFileSync(path)).digest("hex"));
      // Creation times count seconds.
      if (name === "once") await new Promise((resolve) => setTimeout(resolve, 1100));
    }
    expect(digests[1]).toBe(digests[0]);
  });

  it("leave nothing else behind, not even when the encoder fails", async () => {
    const before = readdirSync(folder);
    await expect(encode("bad.mp4", even, { preset: "no-such-preset" })).rejects.toThrow("encoder stopped");
    expect(readdirSync(folder).filter((name) => name.includes("evenly-timed"))).toEqual([]);
    expect(readdirSync(folder)).toEqual(before);
  });
});
