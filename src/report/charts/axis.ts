import type { ScaleLinear } from "d3";
import { type Markup, markup } from "../markup.ts";

/** Horizontal axis under a chart: ticks with numbers, and what is shown with its unit. */
export function axisBelow(scale: ScaleLinear<number, number>, y: number, label: string, count = 7): Markup {
  const [left, right] = scale.range() as [number, number];
  const write = scale.tickFormat(count);
  const ticks = scale
    .ticks(count)
    .map(
      (value) =>
        markup`<g transform="translate(${place(scale(value))},${place(y)})"><line class="lw-tick" y2="5"/><text class="lw-number" y="18" text-anchor="middle">${write(value)}</text></g>`,
    );
  return markup`<line class="lw-axis" x1="${place(left)}" x2="${place(right)}" y1="${place(y)}" y2="${place(y)}"/>${ticks}<text class="lw-label" x="${place((left + right) / 2)}" y="${place(y + 36)}" text-anchor="middle">${label}</text>`;
}

/** Vertical axis left of a chart, with faint lines across to `right`; its label stands above it. */
export function axisLeft(
  scale: ScaleLinear<number, number>,
  x: number,
  right: number,
  label: string,
  count = 5,
): Markup {
  const write = scale.tickFormat(count);
  const top = Math.min(...scale.range());
  const ticks = scale
    .ticks(count)
    .map(
      (value) =>
        markup`<g transform="translate(${place(x)},${place(scale(value))})"><line class="lw-grid" x2="${place(right - x)}"/><text class="lw-number" x="-7" y="4" text-anchor="end">${write(value)}</text></g>`,
    );
  return markup`${ticks}<text class="lw-label" x="${place(x)}" y="${place(top - 10)}" text-anchor="start">${label}</text>`;
}

/** A coordinate with two decimals: plenty for a screen and for paper, and the same text on every machine. */
export function place(value: number): string {
  if (!Number.isFinite(value)) throw new Error(`a chart was given ${value}`);
  return String(Math.round(value * 100) / 100 + 0);
}
