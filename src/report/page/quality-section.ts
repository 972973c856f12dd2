import type { MeasuredTrial, QualityCheck } from "../../quantities/index.ts";
import { countCells } from "../cell-counts.ts";
import { type Markup, markup } from "../markup.ts";
import { readableAlone } from "../numbers.ts";
import { asWords, share } from "./words.ts";

/** What was checked of the footage: verdict as shape and word, what to do when filming again, and the figure behind it. */
export function qualitySection({ quality }: MeasuredTrial): Markup {
  if (quality.length === 0) return markup``;
  return markup`<section><h2>Footage</h2><div class="scroll" tabindex="0" role="region" aria-label="Footage checks"><table class="checks"><thead><tr><th scope="col">Check</th><th scope="col">Verdict</th><th scope="col">What it means</th><th scope="col">Figure</th></tr></thead><tbody>${quality.map(
    (check) =>
      markup`<tr><th scope="row">${asWords(check.check)}</th><td>${mark(check.verdict)}</td><td>${check.advice}</td><td class="measure">${figureOf(check)}</td></tr>`,
  )}</tbody></table></div></section>`;
}

/** The checks in one line, those that limit the figures by name: `crowding poor, exposure fair, the rest good`. */
export function checksInWords(quality: readonly QualityCheck[]): string {
  const named = (["poor", "fair", "unknown"] as const).flatMap((verdict) =>
    quality
      .filter((check) => check.verdict === verdict)
      .map((check) => `${asWords(check.check).toLowerCase()} ${verdict}`),
  );
  if (named.length === 0) return `all ${quality.length} checks good`;
  return [...named, ...(named.length < quality.length ? ["the rest good"] : [])].join(", ");
}

/** Three digits and what they count; a share as a percentage. */
function figureOf({ figure, unit }: QualityCheck): Markup {
  if (figure === null) return markup`<span class="quiet">not known</span>`;
  const part = /^share (of .*)$/.exec(unit)?.[1];
  const number = part
    ? figure > 0 && figure < 0.0005
      ? "below 0.1\u00a0%"
      : share(figure)
    : readableAlone(three(figure));
  return markup`${number} <span class="quiet">${part ?? unit}</span>`;
}

const three = (figure: number) => Number(figure.toPrecision(3));

const shapes: Readonly<Record<QualityCheck["verdict"], Markup>> = {
  good: markup`<circle class="full" cx="6" cy="6" r="4.6"/>`,
  fair: markup`<circle cx="6" cy="6" r="4.6"/><path class="full" d="M6 1.4a4.6 4.6 0 0 0 0 9.2z"/>`,
  poor: markup`<path d="M2 2L10 10M10 2L2 10"/>`,
  unknown: markup`<path d="M2 6H10"/>`,
};

function mark(verdict: QualityCheck["verdict"]): Markup {
  return markup`<span class="mark ${verdict}"><svg viewBox="0 0 12 12" aria-hidden="true">${shapes[verdict]}</svg>${verdict}</span>`;
}

/** Cells that don't count in the figures, by reason. */
export function setAsideSection({ cells }: MeasuredTrial): Markup {
  const { paths, kept, setAside } = countCells(cells);
  if (setAside.length === 0) return markup``;
  return markup`<section><h2>Cells not counted</h2><p>${String(paths - kept)} of ${String(paths)} paths are not in the mean speed. All are in the tables, with the reason.</p><table class="compact"><thead><tr><th scope="col">Reason</th><th scope="col" class="number">Paths</th></tr></thead><tbody>${setAside.map(
    ({ reason, count }) =>
      markup`<tr><th scope="row"><bdi>${reason || "no reason given"}</bdi></th><td class="number">${String(count)}</td></tr>`,
  )}</tbody></table></section>`;
}
