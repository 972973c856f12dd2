import { describe, expect, it } from "vitest";
import { type Pretence, pretendDecoder, pretendRecording } from "../../tests/helpers/pretend-decoder.ts";
import { DecoderChoice } from "./decoder-choice.ts";
import { footageOf } from "./footage-of.ts";
import type { Recording } from "./recording.ts";

async function read(recording: Recording, pretences: readonly (Pretence | null)[]) {
  const makers = pretences.map(
    (pretence, i) => async () => pretence && pretendDecoder(`way ${i}`, recording, pretence),
  );
  const choice = await DecoderChoice.among(recording, makers, undefined);
  const footage = footageOf({ recording, choice, settings: {}, close() {} });
  const levels: number[] = [];
  const times_s: number[] = [];
  const report = await footage.read(({ t_s, luma }) => {
    levels.push(luma[0]!);
    times_s.push(t_s);
    return "more";
  });
  const codes = report.warnings.map(({ code }) => code);
  return { levels, times_s, report, codes, decoder: footage.facts.decoder };
}

const all = Array.from({ length: 20 }, (_, i) => i);
const recording = pretendRecording(20);

describe("reading", () => {
  it("takes the first decoder that gives a picture, and times from the first frame", async () => {
    const { levels, times_s, codes, decoder } = await read(recording, [null, { fails: { after: 0 } }, {}, {}]);
    expect(decoder).toBe("way 2");
    expect(levels).toEqual(all);
    expect(times_s).toEqual(all.map((i) => (10 * i) / 100));
    expect(codes).toEqual([]);
  });

  it("goes on with another decoder that gives the same pictures, each delivered once", async () => {
    const { levels, codes, decoder } = await read(recording, [{ fails: { after: 7 } }, {}]);
    expect(decoder).toBe("way 1");
    expect(levels).toEqual(all);
    expect(codes).toEqual(["decoder-changed"]);
  });

  it("never mixes decoders that give different pictures", async () => {
    const { levels, codes } = await read(recording, [{ fails: { after: 7 } }, { level: (i) => (i === 5 ? 99 : i) }]);
    expect(levels).toEqual(all.slice(0, 7));
    expect(codes).toEqual(["decoders-differ", "recording-cut-off"]);
  });

  it("keeps what there is when no decoder is left", async () => {
    const { levels, codes, report } = await read(recording, [{ fails: { after: 7 } }, { fails: { after: 0 } }]);
    expect(levels).toEqual(all.slice(0, 7));
    expect(codes.at(-1)).toBe("recording-cut-off");
    expect(report.warnings.at(-1)!.message).toMatch(/7 of 20 frames.*1\.30 s/);
  });

  it("asks a decoder that was taken away once more", async () => {
    const cause = Object.assign(new Error("reclaimed"), { name: "QuotaExceededError" });
    const { levels, codes, decoder } = await read(recording, [{ fails: { after: 7, once: true, cause } }]);
    expect(decoder).toBe("way 0");
    expect(levels).toEqual(all);
    expect(codes).toEqual(["decoder-changed"]);
  });

  it("says how many frames could not be decoded; the others keep their times", async () => {
    const { times_s, report } = await read(recording, [{ lacks: [3, 4] }]);
    expect(times_s).toEqual(all.filter((i) => i !== 3 && i !== 4).map((i) => (10 * i) / 100));
    expect(report.warnings).toMatchObject([{ code: "frames-undecoded", message: expect.stringMatching(/^2 of 20 /) }]);
  });

  it("counts repeated pictures", async () => {
    const { report } = await read(recording, [{ level: (i) => Math.max(2, i) }]);
    expect(report.repeatedFrames).toEqual([1, 2]);
  });

  it("warns when the frame rate changes along the recording", async () => {
    const ticks = Float64Array.from({ length: 120 }, (_, i) => (i < 60 ? i : 60 + 8 * (i - 60)));
    expect((await read(pretendRecording(120, { ticks }), [{}])).codes).toEqual(["rate-changes"]);
  });

  it("refuses what no decoder opens, with the reason", async () => {
    const refusal = (changes: Partial<Recording>) =>
      read(pretendRecording(5, changes), [null, { fails: { after: 0 } }]).catch((error: unknown) => error);
    expect(await refusal({})).toMatchObject({ code: "recording-damaged", where: "pretend.mp4" });
    expect(await refusal({ cutShort: true })).toMatchObject({ code: "recording-cut-off" });
    expect(await refusal({ codec: "odd" })).toMatchObject({ code: "codec-not-supported" });
  });
});
