import { scaleLinear } from "d3";
import { useMemo } from "react";
import type { Figure } from "../../quantities/index.ts";
import { fittingSwarm, readable } from "../../report/index.ts";
import { useSize } from "../footage/use-size.ts";

interface SpeedSwarmProps {
  readonly speeds: readonly { readonly p: number; readonly speed: number }[];
  readonly mean: Figure | null;
  readonly unit: string;
  /** Chosen cell as index of its path. */
  readonly cell: number | null;
  readonly choose: (p: number) => void;
}

const middle = 46;
const room = 34;
const bottom = middle + room + 6;

/** The speed of every cell as a dot, with the mean and its interval; a dot chooses its cell. */
export function SpeedSwarm({ speeds, mean, unit, cell, choose }: SpeedSwarmProps) {
  const [ref, { width }] = useSize<HTMLDivElement>();
  const { x, radius, dots } = useMemo(() => {
    const most = Math.max(...speeds.map((it) => it.speed), mean?.ci95[1] ?? 0, 1e-9);
    const x = scaleLinear([0, most], [8, Math.max(60, width - 18)]).nice(6);
    const along = speeds.map((it) => x(it.speed));
    return { x, ...fittingSwarm(along, [5, 4, 3.2, 2.5, 2, 1.5, 1], room) };
  }, [speeds, mean, width]);
  const label = `Speeds of ${speeds.length} cells in ${unit}${mean ? `; the mean is ${readable(mean.value, null)}` : ""}. The table of cells lists them.`;
  return (
    <div className="speed-swarm" ref={ref}>
      {/* The table below gives the keyboard the same choice. */}
      <svg width={width} height={bottom + 36} role="img" aria-label={label}>
        {mean && mean.n > 1 && (
          <rect
            className="interval"
            x={x(mean.ci95[0])}
            width={Math.max(1, x(mean.ci95[1]) - x(mean.ci95[0]))}
            height={bottom}
          />
        )}
        {mean && <line className="mean" x1={x(mean.value)} x2={x(mean.value)} y2={bottom} />}
        <g className="time-axis" transform={`translate(0 ${bottom})`}>
          <line x1={x.range()[0]} x2={x.range()[1]} />
          {x.ticks(6).map((speed) => (
            <g key={speed} transform={`translate(${x(speed)} 0)`}>
              <line y2={4} />
              <text y={16} textAnchor="middle">
                {speed}
              </text>
            </g>
          ))}
          <text x={x.range()[1]} y={31} textAnchor="end">
            speed of each cell, {unit}
          </text>
        </g>
        {dots.map(({ index, along, aside }) => (
          // biome-ignore lint/a11y/noStaticElementInteractions: the table of cells offers the same to the keyboard
          <circle
            key={speeds[index]!.p}
            className={speeds[index]!.p === cell ? "dot chosen" : "dot"}
            cx={along}
            cy={middle + aside}
            r={speeds[index]!.p === cell ? radius + 2 : radius}
            onClick={() => choose(speeds[index]!.p)}
          >
            <title>
              cell {speeds[index]!.p + 1}: {readable(speeds[index]!.speed, null)} {unit}
            </title>
          </circle>
        ))}
      </svg>
    </div>
  );
}
