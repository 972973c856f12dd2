import { describe, expect, it } from "vitest";
import { LatestWanted } from "./latest-wanted.ts";

describe("LatestWanted", () => {
  it("asks one at a time and skips wishes that were overtaken", () => {
    const asked: number[] = [];
    const wanted = new LatestWanted((wish) => asked.push(wish));
    wanted.want(1);
    wanted.want(2);
    expect(asked).toEqual([]);
    wanted.free();
    expect(asked).toEqual([2]);
    wanted.want(3);
    wanted.want(4);
    expect(asked).toEqual([2]);
    wanted.free();
    expect(asked).toEqual([2, 4]);
    wanted.free();
    wanted.want(5);
    expect(asked).toEqual([2, 4, 5]);
  });
});
