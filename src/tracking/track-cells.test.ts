import { describe, expect, it } from "vitest";
import { normalFrom } from "../../tests/helpers/normal.ts";
import { openView, sightingAt, tableOf } from "../../tests/helpers/simulated-field.ts";
import { evenTimes } from "../../tests/helpers/simulated-tracks.ts";
import { duration_s, type Paths, rowsOf, type Sighting, Stopped, seededRandom } from "../quantities/index.ts";
import { defaultTrackingSettings, trackCells } from "./index.ts";

const view = openView(400, 300);
const noise = 0.2;

type Way = (t: number) => readonly [x: number, y: number];

/** Sightings of cells that go their ways, each with normal error; `seen` says in which frames. */
function watch(
  ways: readonly Way[],
  times: Float64Array,
  seed: number,
  seen: (cell: number, frame: number) => boolean = () => true,
): Sighting[] {
  const normal = normalFrom(seededRandom(seed));
  return ways.flatMap((way, cell) =>
    Array.from(times).flatMap((t, frame) => {
      const [x, y] = way(t);
      const at = sightingAt(frame, x + noise * normal(), y + noise * normal());
      return seen(cell, frame) ? [at] : [];
    }),
  );
}

function follow(sightings: readonly Sighting[], times: Float64Array): Paths {
  return trackCells(tableOf(sightings), times, view, defaultTrackingSettings, {}).paths;
}

/** First and last place, and number of sightings, of every path. */
function outline(paths: Paths) {
  return Array.from({ length: paths.count }, (_, p) => {
    const [a, b] = rowsOf(paths, p);
    return { x0: paths.x_px[a] as number, x1: paths.x_px[b - 1] as number, n: b - a };
  }).sort((a, b) => a.x0 - b.x0);
}

const straight = (x: number, y: number, vx: number, vy: number): Way => {
  return (t) => [x + vx * t, y + vy * t];
};

/** Others that swim about, so that the clip has motion to learn from. */
const company: readonly Way[] = Array.from({ length: 8 }, (_, i): Way => {
  const phase = i;
  return (t) => [
    60 + 40 * (i % 4) + 15 * Math.cos(2.5 * t + phase),
    200 + 40 * (i >> 2) + 15 * Math.sin(2.5 * t + phase),
  ];
});

describe("following cells", () => {
  const times = evenTimes(3, 30);

  it("keeps two cells apart that cross", () => {
    // They meet at x = 200 after 1.5 s, at right angles and head on.
    for (const [a, b] of [
      [straight(110, 40, 60, 24), straight(110, 112, 60, -24)],
      [straight(110, 80, 60, 0), straight(290, 81, -60, 0)],
    ] as const) {
      const paths = follow(watch([a, b, ...company], times, 1), times);
      expect(paths.count).toBe(10);
      const crossers = Array.from({ length: paths.count }, (_, p) => rowsOf(paths, p)).filter(
        ([first]) => (paths.y_px[first] as number) < 150,
      );
      expect(crossers).toHaveLength(2);
      for (const [first, end] of crossers) {
        const x = paths.x_px[first] as number;
        const y = paths.y_px[first] as number;
        const way = [a, b].find((w) => Math.hypot(w(0)[0] - x, w(0)[1] - y) < 2) as Way;
        const [lastX, lastY] = way(3);
        // Five standard deviations of a sighting's place.
        expect(
          Math.hypot((paths.x_px[end - 1] as number) - lastX, (paths.y_px[end - 1] as number) - lastY),
        ).toBeLessThan(1.5);
      }
    }
  });

  it("keeps a cell that is missed for some frames one path", () => {
    const missed = (cell: number, frame: number) => cell > 0 || ![20, 21, 40, 41, 42, 43, 60].includes(frame);
    const paths = follow(watch([straight(60, 60, 70, 10), ...company], times, 2, missed), times);
    expect(paths.count).toBe(9);
    expect(outline(paths).some((o) => o.n === 91 - 7 && o.x1 - o.x0 > 200)).toBe(true);
  });

  it("joins what a longer gap has torn apart", () => {
    // 0.4 s: longer than a cell is waited for, shorter than pieces are joined over.
    const gone = (cell: number, frame: number) => cell > 0 || frame < 40 || frame >= 52;
    const paths = follow(watch([straight(60, 60, 70, 10), ...company], times, 3, gone), times);
    expect(paths.count).toBe(9);
    expect(outline(paths).some((o) => o.n === 79 && o.x1 - o.x0 > 200)).toBe(true);
  });

  it("does not join what doesn't fit", () => {
    const otherWay: Way = (t) => (t < 40 / 30 ? [60 + 70 * t, 60] : [250, 10 + 25 * (t - 40 / 30)]);
    const gone = (cell: number, frame: number) => cell > 0 || frame < 36 || frame >= 48;
    const paths = follow(watch([otherWay, ...company], times, 4, gone), times);
    expect(paths.count).toBe(10);
  });

  it("keeps cells that turn round when the field is reversed", () => {
    // 60 px/s to the right, then within 0.2 s round a half circle to the left.
    const turning = (x: number, y: number): Way => {
      const turn = Math.PI / 0.2;
      const radius = 60 / turn;
      return (t) => {
        if (t < 1.5) return [x + 60 * t, y];
        const angle = Math.min(turn * (t - 1.5), Math.PI);
        const after = Math.max(0, t - 1.7);
        return [x + 90 + radius * Math.sin(angle) - 60 * after, y + radius * (1 - Math.cos(angle))];
      };
    };
    const ways = Array.from({ length: 12 }, (_, i) => turning(40 + 75 * (i % 4), 60 + 70 * Math.floor(i / 4)));
    const paths = follow(watch(ways, times, 5), times);
    expect(paths.count).toBe(12);
    for (const { n } of outline(paths)) expect(n).toBe(91);
  });

  it("keeps the one cell among calm ones that turns back at once, missed as it does", () => {
    const back: Way = (t) => [t < 1.5 ? 60 + 150 * t : 285 - 150 * (t - 1.5), 80];
    const missed = (cell: number, frame: number) => cell > 0 || frame < 45 || frame > 47;
    const paths = follow(watch([back, ...company], times, 16, missed), times);
    expect(paths.count).toBe(9);
    expect(outline(paths).some((o) => o.n === 88)).toBe(true);
  });

  it("uses each frame's own time", () => {
    const random = seededRandom(6);
    let now = 0;
    // From 0.25 to 1.75 of an interval, and every tenth frame three intervals late.
    const uneven = Float64Array.from({ length: 80 }, (_, i) => {
      if (i > 0) now += i % 10 === 0 ? 0.1 : (0.25 + 1.5 * random()) / 30;
      return now;
    });
    const ways = [straight(20, 40, 100, 15), straight(360, 70, -100, 10), straight(30, 120, 90, -12), ...company];
    const paths = follow(watch(ways, uneven, 7), uneven);
    expect(paths.count).toBe(11);
    for (const { n } of outline(paths)) expect(n).toBe(80);
  });

  it.each([21, 22, 23, 24, 25])("makes no path that counts of false alarms (%d)", (seed) => {
    const long = evenTimes(20, 30);
    const alarmsAt = (perFrame: number) => {
      const random = seededRandom(seed);
      return Array.from(long).flatMap((_, frame) =>
        random() < perFrame ? [sightingAt(frame, 400 * random(), 300 * random(), { snr: 6 })] : [],
      );
    };
    // As many as are allowed by default: none, alone or among cells.
    expect(follow(alarmsAt(0.1), long).count).toBe(0);
    expect(follow([...watch(company, long, 9), ...alarmsAt(0.1)], long).count).toBe(company.length);
    // Three times as many: none that lasts the half second from which cells count.
    const paths = follow(alarmsAt(0.3), long);
    for (let p = 0; p < paths.count; p++) expect(duration_s(paths, p)).toBeLessThan(0.5);
  });

  it("keeps cells whole where every other frame only repeats the one before", () => {
    const seen = (_: number, frame: number) => frame % 2 === 0;
    const paths = follow(watch([straight(60, 60, 40, 10), ...company], times, 15, seen), times);
    expect(paths.count).toBe(9);
    for (const { n } of outline(paths)) expect(n).toBe(46);
  });

  it("says how paths began and ended", () => {
    const ways: Way[] = [
      straight(150, 30, 10, 0),
      straight(-30, 60, 80, 0),
      straight(330, 90, 60, 0),
      straight(200, 120, 4, 2),
    ];
    const seen = (cell: number, frame: number) => {
      const [x] = (ways[cell] as Way)(times[frame] as number);
      return x >= 0 && x <= 399 && (cell !== 3 || (frame >= 20 && frame < 70));
    };
    const paths = follow(watch(ways, times, 10, seen), times);
    const ends = Array.from({ length: paths.count }, (_, p) => {
      const y = Math.round((paths.y_px[paths.start[p] as number] as number) / 30);
      return [y, paths.began[p], paths.ended[p]];
    }).sort((a, b) => (a[0] as number) - (b[0] as number));
    expect(ends).toEqual([
      [1, "first frame", "last frame"],
      [2, "entered view", "last frame"],
      [3, "first frame", "left view"],
      [4, "appeared", "lost"],
    ]);
  });

  it("takes the rim of an eyepiece for the edge of the view", () => {
    const round = { ...view, circle: { x: 200, y: 150, radius: 120 }, area_px2: Math.PI * 120 ** 2 };
    const seen = (_: number, frame: number) => (times[frame] as number) < 1.95;
    const { paths } = trackCells(
      tableOf(watch([straight(200, 150, 60, 0)], times, 11, seen)),
      times,
      round,
      defaultTrackingSettings,
      {},
    );
    expect(paths.ended).toEqual(["left view"]);
  });

  it("doesn't depend on the order of sightings within a frame", () => {
    const sightings = watch([straight(110, 80, 60, 0), straight(290, 82, -60, 0), ...company], times, 12);
    const mixed = sightings.map((s, i) => ({ s, key: (i * 7919) % 1009 })).sort((a, b) => a.key - b.key);
    const asSets = (paths: Paths) =>
      Array.from({ length: paths.count }, (_, p) => Array.from(paths.x_px.slice(...rowsOf(paths, p))).join()).sort();
    expect(
      asSets(
        follow(
          mixed.map(({ s }) => s),
          times,
        ),
      ),
    ).toEqual(asSets(follow(sightings, times)));
  });

  it("drops the faint traces that encoders leave of passing cells, and keeps faint cells", () => {
    const cells = watch(company, times, 13);
    const faint = (from: number, to: number) =>
      Array.from({ length: to - from }, (_, i) => sightingAt(from + i, 300 + 0.05 * (i % 3), 60, { snr: 5 }));
    expect(follow([...cells, ...faint(30, 45)], times).count).toBe(company.length);
    expect(follow([...cells, ...faint(0, 45)], times).count).toBe(company.length + 1);
    expect(follow([...cells, ...faint(30, 75)], times).count).toBe(company.length + 1);
  });

  it("measures nothing of nothing, and stops when asked", () => {
    const empty = trackCells(tableOf([]), times, view, defaultTrackingSettings, {});
    expect(empty.paths.count).toBe(0);
    expect(empty.neighbourDistance_px).toBeNull();
    const stop = { signal: { aborted: true } };
    expect(() => trackCells(tableOf(watch(company, times, 14)), times, view, defaultTrackingSettings, stop)).toThrow(
      Stopped,
    );
  });
});
