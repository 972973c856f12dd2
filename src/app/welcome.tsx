import { northHalf, southHalf } from "./chrome/needle.tsx";
import { OpenButtons, type OpenButtonsProps } from "./opening/open-buttons.tsx";
import "./welcome.css";

/** The page before anything is open. */
export function Welcome(props: OpenButtonsProps) {
  return (
    <main className="welcome">
      <Drift />
      <div>
        <h1>Open a recording of swimming cells</h1>
        <p>
          Lodewake finds the cells, follows them, and says how fast they swim, with an interval for every figure. Drop a
          trial folder or a recording anywhere on this page, or choose one.
        </p>
        <OpenButtons {...props} prominent />
        <dl>
          <dt>A trial folder</dt>
          <dd>
            holds a recording and, if you have it, a <code>trial.json</code> with scale, frame rate and field. A folder
            of such folders opens all of them.
          </dd>
          <dt>A recording alone</dt>
          <dd>is mp4, mov, webm, mkv or avi. Give the scale on the page to have speeds in µm/s.</dd>
          <dt>Nothing is sent anywhere.</dt>
          <dd>Everything is computed on this machine, with or without a network.</dd>
        </dl>
      </div>
    </main>
  );
}

/** Needles that turn where the field reverses: the page's only ornament. */
function Drift() {
  const places = Array.from({ length: 18 }, (_, i) => 25 + i * 50);
  return (
    <svg className="drift" viewBox="0 0 900 120" aria-hidden="true">
      {places.map((x) => (
        <g key={x} transform={`translate(${x} 60) rotate(${x < 450 ? 0 : 180}) scale(18)`}>
          <path className="south" d={southHalf} />
          <path className="north" d={northHalf} />
        </g>
      ))}
      <path className="turn" d="M450 14V106" />
    </svg>
  );
}
