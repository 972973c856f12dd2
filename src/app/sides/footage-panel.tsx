import type { MeasuredTrial, QualityCheck } from "../../quantities/index.ts";
import { asWords, readableAlone } from "../../report/index.ts";
import { Facts } from "./facts.tsx";
import "./sides.css";

/** What was checked of the footage, with what to do when filming again, and what the recording is. */
export function FootagePanel({ measured }: { measured: MeasuredTrial }) {
  const { source, quality } = measured;
  return (
    <>
      <ul className="checks">
        {quality.map((check) => (
          <li key={check.check}>
            <h3>
              <Verdict verdict={check.verdict} />
              <span>
                {asWords(check.check)}
                {check.figure !== null && (
                  <small>
                    {readableAlone(Number(check.figure.toPrecision(3)))} {check.unit}
                  </small>
                )}
              </span>
            </h3>
            <p>{check.advice}</p>
          </li>
        ))}
      </ul>
      <h3>Recording</h3>
      <Facts
        facts={[
          ["File", source.recording],
          ["Picture", `${source.width_px} × ${source.height_px} px${turned(source.rotation_deg)}`],
          ["Frames", frames(measured)],
          ["Duration", `${source.duration_s.toFixed(2)} s`],
          ["Frame rate", source.fps_median === null ? null : `${readableAlone(source.fps_median)} frames/s (median)`],
          ["Time stamps", source.timeFactor === 1 ? null : `stretched ×${readableAlone(source.timeFactor)}`],
          ["Coding", `${source.container}, ${source.codec}`],
          ["Decoder", source.decoder],
          ["SHA-256", source.sha256],
        ]}
      />
    </>
  );
}

function turned(rotation_deg: number): string {
  return rotation_deg === 0 ? "" : `, turned by ${rotation_deg}°`;
}

function frames({ source }: MeasuredTrial): string {
  const { frames, framesExpected } = source;
  return framesExpected !== null && framesExpected !== frames ? `${frames} of ${framesExpected}` : String(frames);
}

const shapes: Readonly<Record<QualityCheck["verdict"], string>> = {
  good: "M2 6.5l3 3 5-6.5",
  fair: "M2 6h8M6 2.5v.01M6 9.5v.01",
  poor: "M2.5 2.5l7 7M9.5 2.5l-7 7",
  unknown: "M2 6h8",
};

/** A verdict as a shape and a word. */
function Verdict({ verdict }: Pick<QualityCheck, "verdict">) {
  return (
    <b className={`verdict ${verdict}`}>
      <svg viewBox="0 0 12 12" aria-hidden="true">
        <path d={shapes[verdict]} />
      </svg>
      {verdict}
    </b>
  );
}
