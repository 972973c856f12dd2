import type { ScaleLinear } from "d3";
import { memo } from "react";
import type { FieldDescription } from "../../trial/index.ts";
import { northHalf, southHalf } from "../chrome/needle.tsx";
import { fieldAt, reversalTimes_s } from "./field-over-time.ts";

interface FieldLaneProps {
  readonly field: Extract<FieldDescription, { from: "steps" }>;
  readonly x: ScaleLinear<number, number>;
  readonly end_s: number;
  readonly height: number;
}

/** Distance between two needles, CSS pixels. */
const spacing = 30;

/** The field's direction along time as a row of needles, and a mark at each reversal. */
export const FieldLane = memo(function FieldLane({ field, x, end_s, height }: FieldLaneProps) {
  const [from, to] = x.range() as [number, number];
  const count = Math.max(1, Math.floor((to - from) / spacing));
  const strongest = Math.max(...field.steps.map((step) => step.magnitude_mT), Math.hypot(...field.ambient_mT));
  const needles = Array.from({ length: count }, (_, i) => from + ((i + 0.5) * (to - from)) / count);
  const reversals = reversalTimes_s(field).filter((t_s) => t_s <= end_s);
  return (
    <g className="field-lane" data-reversals={reversals.length}>
      {needles.map((at) => {
        const { magnitude_mT, angle_deg } = fieldAt(field, x.invert(at));
        const length = strongest > 0 ? 11 * Math.sqrt(magnitude_mT / strongest) : 0;
        return length < 1 ? (
          <circle key={at} className="no-field" cx={at} cy={height / 2} r={1.5} />
        ) : (
          <g key={at} transform={`translate(${at} ${height / 2}) rotate(${-angle_deg}) scale(${length})`}>
            <path className="south" d={southHalf} />
            <path className="north" d={northHalf} />
          </g>
        );
      })}
      {reversals.map((t_s) => (
        <g key={t_s} className="reversal" transform={`translate(${x(t_s)} 0)`}>
          <title>The field reverses at {t_s} s</title>
          <line y1={16} y2={height + 22} />
          <path d="M-6 3H4M1 0L5 3L1 6M6 11H-4M-1 8L-5 11L-1 14" />
        </g>
      ))}
    </g>
  );
});
