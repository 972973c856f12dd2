import { area, line, type ScaleLinear } from "d3";
import { memo } from "react";
import { binned } from "./binned.ts";

interface CountLineProps {
  readonly counts: Uint32Array;
  readonly times_s: Float64Array;
  readonly x: ScaleLinear<number, number>;
  readonly top: number;
  readonly height: number;
}

/** How many cells are sighted along the recording, faintly. */
export const CountLine = memo(function CountLine({ counts, times_s, x, top, height }: CountLineProps) {
  const [from, to] = x.range() as [number, number];
  const points = binned(counts, times_s, Math.max(1, Math.floor((to - from) / 2)));
  const most = Math.max(1, ...points.map((point) => point.mean));
  const y = (count: number) => top + height - (count / most) * (height - 4);
  const shape = area<(typeof points)[number]>(
    (point) => x(point.t_s),
    top + height,
    (point) => y(point.mean),
  );
  const edge = line<(typeof points)[number]>(
    (point) => x(point.t_s),
    (point) => y(point.mean),
  );
  return (
    <g className="count-line">
      <title>Cells sighted in each frame, {most.toFixed(0)} at most</title>
      <path className="under" d={shape(points) ?? ""} />
      <path className="edge" d={edge(points) ?? ""} />
    </g>
  );
});
