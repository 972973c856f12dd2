import { describe, expect, it } from "vitest";
import { captureClock } from "./capture-clock.ts";
import { captureRateFromTags } from "./capture-rate-tag.ts";

const codes = ({ warnings }: ReturnType<typeof captureClock>) => warnings.map(({ code }) => code);

describe("capture time", () => {
  it("is container time when nobody says otherwise", () => {
    expect(captureClock(30, undefined, null)).toEqual({ factor: 1, from: "none", warnings: [] });
    expect(captureClock(null, undefined, 240)).toEqual({ factor: 1, from: "none", warnings: [] });
  });

  it("is rescaled by the trial's word, which is stronger than a tag", () => {
    expect(captureClock(30, 240, 120)).toEqual({ factor: 1 / 8, from: "trial", warnings: [] });
    expect(captureClock(30.3, 240, null).factor).toBeCloseTo(30.3 / 240, 12);
  });

  it("is left as it stands when the stated rate is the container's, up to 2 %", () => {
    expect(captureClock(239.2, 240, null)).toEqual({ factor: 1, from: "trial", warnings: [] });
  });

  it("follows a stated rate that fits badly, with a warning", () => {
    const odd = captureClock(30, 100, null);
    expect(odd.factor).toBeCloseTo(0.3, 12);
    expect(codes(odd)).toEqual(["capture-rate-doubtful"]);
    expect(codes(captureClock(30, 10, null))).toEqual(["capture-rate-doubtful"]);
  });

  it("believes a tag that is the container's rate or a whole multiple of it", () => {
    expect(captureClock(30, undefined, 240)).toEqual({ factor: 1 / 8, from: "recording tag", warnings: [] });
    expect(captureClock(240, undefined, 240)).toEqual({ factor: 1, from: "recording tag", warnings: [] });
  });

  it("ignores a tag that fits nothing, with a warning", () => {
    const odd = captureClock(30, undefined, 100);
    expect(odd).toMatchObject({ factor: 1, from: "none" });
    expect(codes(odd)).toEqual(["capture-rate-tag-ignored"]);
  });
});

describe("the phone's capture rate tag", () => {
  const tag = (value: unknown) => captureRateFromTags({ "com.android.capture.fps": value });

  it("is read as a big-endian float, as text, in bytes or not", () => {
    expect(tag(Uint8Array.of(67, 112, 0, 0))).toBe(240);
    expect(tag(new TextEncoder().encode("240.000000"))).toBe(240);
    expect(tag("240.0")).toBe(240);
    expect(tag(["120"])).toBe(120);
    expect(tag(59.94)).toBe(59.94);
  });

  it("is nothing when it is absent or senseless", () => {
    for (const value of [undefined, null, "", "fast", 0, -30, Number.NaN, Uint8Array.of(0, 0, 0, 0)])
      expect(tag(value)).toBeNull();
    expect(captureRateFromTags(undefined)).toBeNull();
  });
});
