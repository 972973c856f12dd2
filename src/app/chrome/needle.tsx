/** Outline of a compass needle that points right, its north half and its south half. Length 2 about the origin. */
export const northHalf = "M1 0L0 -0.26V0.26z";
export const southHalf = "M-1 0L0 -0.26V0.26z";

/**
 * A compass needle: the filled half points along `angle_deg`, counter-clockwise from the right. Which way is told by
 * filling, not by colour.
 */
export function Needle({ angle_deg, size }: { angle_deg: number; size: number }) {
  return (
    <svg className="needle" width={size} height={size} viewBox="-1.1 -1.1 2.2 2.2" aria-hidden="true">
      <g transform={`rotate(${-angle_deg})`}>
        <path d={southHalf} className="south" />
        <path d={northHalf} className="north" />
      </g>
    </svg>
  );
}
