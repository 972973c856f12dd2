import type { Dispatch } from "react";
import { Icon, type IconName } from "../chrome/icon.tsx";
import { rates, tails_s, type Viewing, type ViewingAction } from "../state/viewing.ts";
import "./transport.css";

interface TransportProps {
  readonly view: Viewing;
  readonly t_s: number;
  readonly hasFindings: boolean;
  readonly dispatch: Dispatch<ViewingAction>;
}

/** Plays, steps, says where the footage stands, and which findings are drawn on it. */
export function Transport({ view, t_s, hasFindings, dispatch }: TransportProps) {
  const step = (by: number, icon: IconName, label: string, keys: string) => (
    <button
      type="button"
      className="quiet square"
      aria-label={label}
      title={`${label} (${keys})`}
      disabled={view.frames < 2}
      onClick={() => dispatch({ type: "stepped", by })}
    >
      <Icon name={icon} />
    </button>
  );
  return (
    <section className="transport" aria-label="Playing">
      {step(-view.frames, "start", "First frame", "Home")}
      {step(-1, "back", "One frame back", "←, ten with Shift")}
      <button
        type="button"
        className="square play"
        aria-label={view.playing ? "Pause" : "Play"}
        title={`${view.playing ? "Pause" : "Play"} (space)`}
        disabled={view.frames < 2}
        onClick={() => dispatch({ type: "play toggled" })}
      >
        <Icon name={view.playing ? "pause" : "play"} />
      </button>
      {step(1, "forth", "One frame on", "→, ten with Shift")}
      {step(view.frames, "end", "Last frame", "End")}
      <label className="choice">
        <span className="hidden">Speed of playing</span>
        <select
          value={view.rate}
          onChange={(event) => dispatch({ type: "rate chosen", rate: Number(event.target.value) })}
        >
          {rates.map((rate) => (
            <option key={rate} value={rate}>
              {rate === 1 ? "true speed" : `1/${Math.round(1 / rate)} speed`}
            </option>
          ))}
        </select>
      </label>
      <p className="where">
        <b>{t_s.toFixed(3)}</b> s
        <span>
          frame {view.frames === 0 ? 0 : view.frame + 1} of {view.frames}
        </span>
      </p>
      {hasFindings && <Layers view={view} dispatch={dispatch} />}
    </section>
  );
}

function Layers({ view, dispatch }: Pick<TransportProps, "view" | "dispatch">) {
  const layer = (name: "sightings" | "paths", label: string) => (
    <label className="check">
      <input type="checkbox" checked={view[name]} onChange={() => dispatch({ type: "layer toggled", layer: name })} />
      {label}
    </label>
  );
  return (
    <div className="layers">
      {layer("sightings", "Sightings")}
      {layer("paths", "Paths")}
      <label className="choice">
        <span className="hidden">Length of the paths drawn</span>
        <select
          value={view.tail_s ?? "all"}
          disabled={!view.paths}
          onChange={({ target }) =>
            dispatch({ type: "tail chosen", tail_s: target.value === "all" ? null : Number(target.value) })
          }
        >
          {tails_s.map((tail_s) => (
            <option key={tail_s ?? "all"} value={tail_s ?? "all"}>
              {tail_s === null ? "so far" : `last ${tail_s} s`}
            </option>
          ))}
        </select>
      </label>
    </div>
  );
}
