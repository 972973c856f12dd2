import { describe, expect, it } from "vitest";
import { type FootageEvidence, judgeFootage } from "./index.ts";

const frames = 90;

/** Footage with nothing wrong. */
const fine: FootageEvidence = {
  times_s: Float64Array.from({ length: frames }, (_, i) => i / 30),
  repeatedFrames: 0,
  framesExpected: frames,
  shift: { x_px: new Float32Array(frames), y_px: new Float32Array(frames) },
  gain: new Float32Array(frames).fill(1),
  falseAlarmsPerFrame: 0.1,
  litShare: 1,
  clippedShare: 0,
  spotSigma_px: 2,
  minor_px: new Float32Array(200).fill(1.8),
  snr: new Float32Array(200).fill(25),
  neighbourDistance_px: 80,
  pathDurations_s: [2, 3, 2.5],
  typicalSpeed_px_s: 90,
};

function judge(check: string, changes: Partial<FootageEvidence>) {
  const found = judgeFootage({ ...fine, ...changes }).find((c) => c.check === check);
  if (!found) throw new Error(`no check ${check}`);
  return found;
}

describe("quality of footage", () => {
  it("is good all round where nothing is wrong, each check with advice of its own", () => {
    const checks = judgeFootage(fine);
    expect(checks.map((c) => [c.check, c.verdict])).toEqual(
      [
        "contrast",
        "focus",
        "crowding",
        "frame_rate",
        "dropped_frames",
        "repeated_frames",
        "path_length",
        "false_alarms",
        "shake",
        "exposure",
        "exposure_drift",
        "field_of_view",
      ].map((name) => [name, "good"]),
    );
    expect(new Set(checks.map((c) => c.advice)).size).toBe(checks.length);
  });

  // Figures worked by hand from the definitions.
  it.each<[string, Partial<FootageEvidence>, number, string]>([
    ["contrast", { snr: Float32Array.of(4, 9, 30) }, 9, "fair"],
    ["contrast", { snr: new Float32Array(9).fill(5) }, 5, "poor"],
    ["focus", { minor_px: Float32Array.of(1, 1, 1, 1, 1, 1, 2, 2, 2, 2) }, 0.4, "fair"],
    ["focus", { minor_px: Float32Array.of(1, 1, 1, 2, 2, 2, 2, 2, 2, 2) }, 0.7, "poor"],
    ["crowding", { neighbourDistance_px: 16 }, 8, "fair"],
    ["crowding", { neighbourDistance_px: 10 }, 5, "poor"],
    // 900 px/s at 30 frames/s is 30 px a frame.
    ["frame_rate", { typicalSpeed_px_s: 900 }, 30 / 80, "fair"],
    ["frame_rate", { typicalSpeed_px_s: 2400 }, 1, "poor"],
    ["path_length", { pathDurations_s: [0.2, 0.4, 9] }, 0.4, "poor"],
    ["false_alarms", { falseAlarmsPerFrame: 1 }, 1, "fair"],
    ["false_alarms", { falseAlarmsPerFrame: 5 }, 5, "poor"],
    ["exposure", { clippedShare: 0.05 }, 0.05, "fair"],
    ["field_of_view", { litShare: 0.1 }, 0.1, "poor"],
    ["repeated_frames", { repeatedFrames: 18 }, 0.2, "poor"],
  ])("%s", (check, changes, figure, verdict) => {
    const found = judge(check, changes);
    expect(found.figure).toBeCloseTo(figure, 6);
    expect(found.verdict).toBe(verdict);
  });

  it("counts frames missing between their times, and allows for a wandering rate", () => {
    // Ten frames an even step apart with two gaps: of two frames and of one.
    const gaps = Float64Array.of(0, 1, 2, 5, 6, 7, 9, 10, 11, 12).map((v) => v / 30);
    expect(judge("dropped_frames", { times_s: gaps }).figure).toBeCloseTo(3 / 13, 9);
    const wandering = Float64Array.from({ length: 60 }, (_, i) => i / 30 + 0.08 * Math.sin(i / 20));
    expect(judge("dropped_frames", { times_s: wandering }).figure).toBe(0);
  });

  it("measures shake by its steps, not by where the picture ends up", () => {
    const drifted = Float32Array.from({ length: frames }, (_, i) => i * 0.01);
    expect(judge("shake", { shift: { x_px: drifted, y_px: drifted } }).verdict).toBe("good");
    const jumping = Float32Array.from({ length: frames }, (_, i) => (i % 2) * 3);
    const shake = judge("shake", { shift: { x_px: jumping, y_px: new Float32Array(frames) } });
    expect(shake.figure).toBeCloseTo(3, 6);
    expect(shake.verdict).toBe("fair");
  });

  it("tells a changing exposure from one odd frame", () => {
    const swinging = Float32Array.from({ length: frames }, (_, i) => 1 + 0.2 * Math.sin(i / 5));
    const found = judge("exposure_drift", { gain: swinging });
    expect(found.verdict).toBe("poor");
    expect(found.figure).toBeCloseTo(0.4, 2);
    const odd = new Float32Array(frames).fill(1);
    odd[40] = 1.8;
    expect(judge("exposure_drift", { gain: odd }).verdict).toBe("good");
  });

  it("says unknown where there is nothing to tell by, and never a number that isn't one", () => {
    const nothing: FootageEvidence = {
      ...fine,
      shift: null,
      falseAlarmsPerFrame: null,
      spotSigma_px: null,
      minor_px: new Float32Array(),
      snr: new Float32Array(),
      neighbourDistance_px: null,
      pathDurations_s: [],
      typicalSpeed_px_s: null,
    };
    const unknown = judgeFootage(nothing).filter((c) => c.verdict === "unknown");
    expect(unknown.map((c) => c.check)).toEqual([
      "contrast",
      "focus",
      "crowding",
      "frame_rate",
      "path_length",
      "false_alarms",
      "shake",
    ]);
    for (const { figure } of unknown) expect(figure).toBeNull();
    for (const { figure } of judgeFootage({ ...nothing, times_s: Float64Array.of(0) })) {
      expect(figure === null || Number.isFinite(figure)).toBe(true);
    }
  });
});
