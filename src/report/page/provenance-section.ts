import type { MeasuredTrial } from "../../quantities/index.ts";
import { asJson } from "../json.ts";
import { type Markup, markup } from "../markup.ts";
import { methodsText } from "../methods-text.ts";
import { readableAlone, withUncertainty } from "../numbers.ts";
import { withUnit } from "./figures-section.ts";

/** Where the figures come from: recording, decoder, clock, scale, version, and all settings. */
export function provenanceSection(measured: MeasuredTrial): Markup {
  const { source, scale, tool } = measured;
  const frames =
    source.framesExpected !== null && source.framesExpected !== source.frames
      ? `${source.frames} decoded, ${source.framesExpected} expected`
      : String(source.frames);
  const scaleText = scale
    ? `${withUncertainty(scale.um_per_px, scale.uncertainty_um_per_px)} µm per pixel, from ${scale.from}`
    : "none given; lengths are in pixels";
  const clock =
    source.timeFactor === 1
      ? "the recording’s own time stamps"
      : `time stamps × ${readableAlone(source.timeFactor)}, from ${source.timeFactorFrom}`;
  const entries: [string, string | Markup][] = [
    ["Recording", markup`<bdi>${source.recording}</bdi>`],
    ["SHA-256", markup`<span class="hash">${source.sha256}</span>`],
    [
      "Picture",
      `${source.width_px} × ${source.height_px} px${source.rotation_deg ? `, turned upright by ${source.rotation_deg}°` : ""}`,
    ],
    ["Frames", frames],
    ["Length", withUnit(source.duration_s, "s")],
    ["Frame rate", source.fps_median === null ? "not known" : `${readableAlone(source.fps_median)} frames/s (median)`],
    ["Clock", clock],
    ["Container, codec", `${source.container}, ${source.codec}`],
    ["Decoder", source.decoder],
    ["Scale", scaleText],
    ["Measured with", `${tool.name} ${tool.version}`],
  ];
  const settings = JSON.stringify(asJson(measured.settings), null, 2);
  return markup`<section><h2>Provenance</h2><dl>${entries.map(([name, value]) => markup`<dt>${name}</dt><dd>${value}</dd>`)}</dl><details><summary>All settings</summary><pre>${settings}</pre></details></section>`;
}

/** A methods section ready to paste, with its references. */
export function methodsSection(measured: MeasuredTrial): Markup {
  const { paragraphs, references } = methodsText(measured);
  return markup`<section><h2>Methods, ready to paste</h2>${paragraphs.map((text) => markup`<p>${text}</p>`)}<ul class="references">${references.map((it) => markup`<li>${it.full}</li>`)}</ul></section>`;
}
