import { type FormEvent, useId, useState } from "react";
import type { MeasuredTrial } from "../../quantities/index.ts";
import { withUncertainty } from "../../report/index.ts";
import type { TrialDescription } from "../../trial/index.ts";
import "./sides.css";

interface ScalePanelProps {
  readonly description: TrialDescription;
  readonly measured: MeasuredTrial | null;
  readonly describe: (description: TrialDescription) => void;
}

/** The scale of the picture and the true frame rate: as the trial states them, to be mended while the page is open. */
export function ScalePanel({ description, measured, describe }: ScalePanelProps) {
  const { scale, captureFps } = description;
  const id = useId();
  const numbers = scale?.from === "numbers" ? scale : null;
  const [size, setSize] = useState(numbers ? String(numbers.um_per_px) : "");
  const [uncertainty, setUncertainty] = useState(numbers ? String(numbers.uncertainty_um_per_px) : "");
  const [rate, setRate] = useState(captureFps === null ? "" : String(captureFps));

  const use = (event: FormEvent) => {
    event.preventDefault();
    describe({
      ...description,
      scale: size
        ? { from: "numbers", um_per_px: Number(size), uncertainty_um_per_px: Number(uncertainty || 0) }
        : numbers
          ? null
          : scale,
      captureFps: rate ? Number(rate) : null,
    });
  };
  const field = (
    name: string,
    label: string,
    unit: string,
    value: string,
    set: (text: string) => void,
    min: number,
  ) => (
    <label htmlFor={`${id}-${name}`}>
      {label}
      <span>
        <input
          id={`${id}-${name}`}
          type="number"
          step="any"
          min={min}
          value={value}
          onChange={(event) => set(event.target.value)}
        />
        {unit}
      </span>
    </label>
  );
  return (
    <>
      <p className="lead">{scaleWords(measured, scale)}</p>
      <form className="numbers" onSubmit={use}>
        {field("size", "Scale", "µm per pixel", size, setSize, 1e-9)}
        {field("uncertainty", "Standard uncertainty", "µm per pixel", uncertainty, setUncertainty, 0)}
        {field("rate", "True capture rate, if slow motion", "frames/s", rate, setRate, 1e-9)}
        <button type="submit">Use for the next measurement</button>
      </form>
      <p className="small-print">
        These stand for as long as the page is open; write them into <code>trial.json</code> to keep them. The
        uncertainty of the scale is part of every interval in µm/s.
      </p>
    </>
  );
}

function scaleWords(measured: MeasuredTrial | null, stated: TrialDescription["scale"]) {
  const scale = measured?.scale;
  if (scale) {
    return (
      <>
        Measured with <b>{withUncertainty(scale.um_per_px, scale.uncertainty_um_per_px)} µm</b> per pixel.
      </>
    );
  }
  if (measured) return "Measured without a scale: speeds are in pixels a second.";
  if (stated?.from === "micrometer") return `The trial refers to the stage micrometer ${stated.file}.`;
  return stated ? "The trial states its scale." : "The trial states no scale: speeds will be in pixels a second.";
}
