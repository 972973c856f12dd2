import { describe, expect, it } from "vitest";
import { greyDepth, lumaGraph, lumaOfRgb } from "./luma-filter.ts";
import { PictureLog } from "./picture-log.ts";

describe("luma of a pixel format", () => {
  it("is taken as it is where it has a plane of its own", () => {
    for (const format of ["yuv420p", "yuvj422p", "yuv444p10le", "yuva420p", "gray", "gray12le"])
      expect(lumaGraph(format)).toBe("extractplanes=y");
  });

  it("is parted from chroma first where both are mixed", () => {
    expect(lumaGraph("yuyv422")).toBe("format=yuv422p,extractplanes=y");
    expect(lumaGraph("nv12")).toBe("format=yuv420p,extractplanes=y");
  });

  it("is computed where there is none", () => {
    expect(lumaGraph("bgr24")).toBe("format=rgb24");
    const luma = new Uint8Array(5);
    lumaOfRgb(Uint8Array.of(0, 0, 0, 255, 255, 255, 255, 0, 0, 0, 255, 0, 0, 0, 255), luma);
    expect([...luma]).toEqual([0, 255, 77, 149, 29]);
  });

  it("has the depth its name says", () => {
    expect(["gray", "gray10le", "gray16le", "rgb24"].map(greyDepth)).toEqual([8, 10, 16, null]);
  });
});

describe("the core's log of pictures", () => {
  it("gives each picture's time, format and size in turn, whatever stands between", () => {
    const log = new PictureLog();
    log.read("[Parsed_showinfo_1 @ 0x1] config in time_base: 1001/24000, frame_rate: 24000/1001");
    log.read("Stream mapping:\n");
    for (let n = 0; n < 600; n++) {
      const pts = n === 0 ? -5 : n * 3;
      log.read(
        `[Parsed_showinfo_1 @ 0x1] n:${`${n}`.padStart(4)} pts:${`${pts}`.padStart(7)} pts_time:0.1 pos: 9 fmt:gray10le sar:1/1 s:96x40 i:P iskey:1 type:I `,
      );
      if (n % 3 === 2) for (const i of [n - 2, n - 1, n]) expect(log.next()?.pts).toBe(i === 0 ? -5 : i * 3);
    }
    expect(log.next()).toBeUndefined();
    log.read("[Parsed_showinfo_1 @ 0x1] n: 600 pts:   1800 pts_time:75 pos: 9 fmt:gray sar:1/1 s:96x40 i:P ");
    expect(log.next()).toEqual({ pts: 1800, format: "gray", width: 96, height: 40 });
    expect(log.clock).toEqual({ numerator: 1001, denominator: 24_000 });
  });
});
