import { type Dispatch, useEffect, useMemo, useRef } from "react";
import type { MeasuredTrial } from "../../quantities/index.ts";
import { Needle } from "../chrome/needle.tsx";
import type { ViewingAction } from "../state/viewing.ts";
import { type Finding, speedUnit } from "./findings.ts";
import { ShareBar } from "./share-bar.tsx";
import { SpeedSwarm } from "./speed-swarm.tsx";

interface EvidenceProps {
  readonly finding: Finding;
  readonly measured: MeasuredTrial;
  readonly cell: number | null;
  readonly dispatch: Dispatch<ViewingAction>;
}

/** What a finding rests on, drawn, and scrolled into sight. */
export function Evidence(props: EvidenceProps) {
  const box = useRef<HTMLDivElement>(null);
  useEffect(() => {
    box.current?.scrollIntoView({ block: "nearest" });
  }, []);
  return (
    <div ref={box}>
      <Drawn {...props} />
    </div>
  );
}

function Drawn({ finding, measured, cell, dispatch }: EvidenceProps) {
  const { speed, scale, drift } = measured;
  const speeds = useMemo(() => {
    const { factor } = speedUnit(measured);
    return finding.evidence.flatMap((p) => {
      const speed_px_s = measured.cells[p]?.speed_px_s ?? null;
      return speed_px_s === null ? [] : [{ p, speed: speed_px_s * factor }];
    });
  }, [finding, measured]);
  if (finding.name === "share" && speed) return <ShareBar speed={speed} />;
  if (finding.name === "flow" && drift) {
    if (finding.figure === "No flow") return null;
    const [vx, vy] = drift.velocity_px_s;
    return (
      <p className="flow-needle">
        <Needle angle_deg={(Math.atan2(vy, vx) * 180) / Math.PI} size={64} />
        The filled half points the way the fluid flows, as seen on the footage. Flow is taken off every cell’s speed.
      </p>
    );
  }
  if (speeds.length === 0) return null;
  const mean = (scale ? speed?.mean_um_s : speed?.mean_px_s) ?? null;
  return (
    <SpeedSwarm
      speeds={speeds}
      mean={mean}
      unit={speedUnit(measured).unit}
      cell={cell}
      choose={(p) => dispatch({ type: "cell chosen", cell: p, frame: firstFrame(measured, p) })}
    />
  );
}

function firstFrame({ paths }: MeasuredTrial, p: number): number {
  return paths.frame[paths.start[p]!]!;
}
