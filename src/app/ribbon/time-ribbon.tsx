import { scaleLinear } from "d3";
import { type Dispatch, type KeyboardEvent, memo, type PointerEvent, useMemo } from "react";
import type { FieldDescription } from "../../trial/index.ts";
import { nearestFrame } from "../footage/frame-at.ts";
import { useSize } from "../footage/use-size.ts";
import type { ViewingAction } from "../state/viewing.ts";
import { CountLine } from "./count-line.tsx";
import { FieldLane } from "./field-lane.tsx";
import "./time-ribbon.css";

interface TimeRibbonProps {
  readonly times_s: Float64Array;
  readonly frame: number;
  readonly field: FieldDescription | null;
  /** Sightings in each frame; null until measured. */
  readonly counts: Uint32Array | null;
  readonly dispatch: Dispatch<ViewingAction>;
}

const margin = 14;
const laneHeight = 34;
const countHeight = 22;

/** The whole recording as one line of time: drag along it to go through the footage. */
export const TimeRibbon = memo(function TimeRibbon({ times_s, frame, field, counts, dispatch }: TimeRibbonProps) {
  const [ref, { width }] = useSize<HTMLDivElement>();
  const end_s = times_s.at(-1) || 1;
  const x = useMemo(
    () => scaleLinear([0, end_s], [margin, Math.max(margin + 1, width - margin)]).clamp(true),
    [end_s, width],
  );
  const t_s = times_s[frame] ?? 0;
  const fieldHeight = field?.from === "steps" ? laneHeight : 0;
  const height = fieldHeight + countHeight + 20;

  const goTo = (event: PointerEvent) => {
    const at = event.clientX - event.currentTarget.getBoundingClientRect().left;
    dispatch({ type: "went", frame: nearestFrame(times_s, x.invert(at)) });
  };
  const press = (event: KeyboardEvent) => {
    if (event.key !== "PageUp" && event.key !== "PageDown") return;
    event.preventDefault();
    const by = Math.max(1, Math.round(times_s.length / 20));
    dispatch({ type: "stepped", by: event.key === "PageUp" ? by : -by });
  };

  return (
    <div className="time-ribbon" ref={ref}>
      <div
        className="slide"
        role="slider"
        tabIndex={0}
        aria-label="Time in the recording"
        aria-valuemin={0}
        aria-valuemax={Number(end_s.toFixed(3))}
        aria-valuenow={Number(t_s.toFixed(3))}
        aria-valuetext={`${t_s.toFixed(2)} seconds, frame ${frame + 1} of ${times_s.length}`}
        onPointerDown={(event) => {
          event.currentTarget.setPointerCapture(event.pointerId);
          goTo(event);
        }}
        onPointerMove={(event) => event.buttons & 1 && goTo(event)}
        onKeyDown={press}
      >
        <svg width={width} height={height} aria-hidden="true">
          {times_s.length > 0 && <TimeAxis x={x} y={fieldHeight + countHeight} />}
          {counts && <CountLine counts={counts} times_s={times_s} x={x} top={fieldHeight} height={countHeight} />}
          {field?.from === "steps" && <FieldLane field={field} x={x} end_s={end_s} height={fieldHeight} />}
          <g className="playhead" transform={`translate(${x(t_s)} 0)`}>
            <line y1={0} y2={height - 18} />
            <path d={`M-4.5 ${height - 14}L0 ${height - 20}L4.5 ${height - 14}z`} />
          </g>
        </svg>
      </div>
      {field?.from === "log" && <p className="ribbon-note">The field is in {field.file}; logs are not drawn here.</p>}
    </div>
  );
});

type TimeScale = ReturnType<typeof scaleLinear<number, number>>;

const TimeAxis = memo(function TimeAxis({ x, y }: { x: TimeScale; y: number }) {
  const [from, to] = x.range() as [number, number];
  const ticks = x.ticks(Math.max(2, Math.floor((to - from) / 90)));
  return (
    <g className="time-axis">
      <line x1={from} x2={to} y1={y} y2={y} />
      {ticks.map((t_s, i) => (
        <g key={t_s} transform={`translate(${x(t_s)} ${y})`}>
          <line y2={4} />
          <text y={15} textAnchor={x(t_s) > to - 14 ? "end" : i === 0 ? "start" : "middle"}>
            {i === 0 ? `${t_s} s` : t_s}
          </text>
        </g>
      ))}
    </g>
  );
});
