import type { SpeedFinding } from "../../quantities/index.ts";

/** The motile share of the judged cells as a bar, with its interval on it. */
export function ShareBar({ speed }: { speed: SpeedFinding }) {
  const { motile_fraction, ci95_motile_fraction: ci95, n_judged } = speed;
  if (motile_fraction === null) return null;
  const motile = Math.round(motile_fraction * n_judged);
  const percent = (fraction: number) => `${(100 * fraction).toFixed(1)}%`;
  return (
    <div className="share-bar">
      <div className="bar">
        <span className="part" style={{ width: percent(motile_fraction) }} />
        {ci95 && <span className="interval" style={{ left: percent(ci95[0]), width: percent(ci95[1] - ci95[0]) }} />}
      </div>
      <p>
        <span>{motile} swim</span>
        <span>{n_judged - motile} don’t</span>
      </p>
    </div>
  );
}
