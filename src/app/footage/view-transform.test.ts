import { describe, expect, it } from "vitest";
import { fitted, moved, toPicture, toStage, zoomedAt } from "./view-transform.ts";

const picture = { width: 1280, height: 720 };
const stage = { width: 640, height: 600 };
const whole = fitted(picture, stage);

describe("fitted", () => {
  it("shows all of the picture, in the middle", () => {
    expect(whole).toEqual({ zoom: 0.5, left: 0, top: 120 });
  });

  it("puts the centre of the first pixel half a pixel from the corner", () => {
    expect(toStage(whole, { x: 0, y: 0 })).toEqual({ x: 0.25, y: 120.25 });
    expect(toStage(whole, { x: 1279.5, y: 719.5 })).toEqual({ x: 640, y: 480 });
  });
});

describe("zoomedAt", () => {
  it("keeps the point under the pointer where it is", () => {
    const at = { x: 200, y: 300 };
    const before = toPicture(whole, at);
    const zoomed = zoomedAt(whole, 3, at, picture, stage);
    expect(zoomed.zoom).toBe(1.5);
    const after = toPicture(zoomed, at);
    expect(after.x).toBeCloseTo(before.x, 9);
    expect(after.y).toBeCloseTo(before.y, 9);
  });

  it("never shrinks below the whole picture, never past 16", () => {
    expect(zoomedAt(whole, 0.1, { x: 9, y: 9 }, picture, stage)).toEqual(whole);
    expect(zoomedAt(whole, 1e6, { x: 9, y: 300 }, picture, stage).zoom).toBe(16);
  });
});

describe("moved", () => {
  it("stops at the edges of the picture", () => {
    const near = zoomedAt(whole, 4, { x: 320, y: 300 }, picture, stage);
    expect(moved(near, { x: 1e5, y: 1e5 }, picture, stage)).toMatchObject({ left: 0, top: 0 });
    expect(moved(near, { x: -1e5, y: -1e5 }, picture, stage)).toMatchObject({ left: -1920, top: -840 });
    expect(moved(whole, { x: 50, y: 50 }, picture, stage)).toEqual(whole);
  });
});

describe("toPicture", () => {
  it("is the inverse of toStage", () => {
    const near = zoomedAt(whole, 4, { x: 100, y: 200 }, picture, stage);
    const point = toPicture(near, toStage(near, { x: 31.25, y: 700.5 }));
    expect(point.x).toBeCloseTo(31.25, 9);
    expect(point.y).toBeCloseTo(700.5, 9);
  });
});
