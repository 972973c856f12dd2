import type { MeasuredTrial, QualityCheck } from "../../quantities/index.ts";
import { countCells } from "../cell-counts.ts";
import { type Markup, markup } from "../markup.ts";
import { withUnit } from "./figures-section.ts";
import { asWords } from "./words.ts";

/** What was checked of the footage: figure, verdict as shape and word, and what to do when filming again. */
export function qualitySection({ quality }: MeasuredTrial): Markup {
  if (quality.length === 0) return markup``;
  return markup`<section><h2>Footage</h2><div class="scroll" tabindex="0" role="region" aria-label="Footage checks"><table><thead><tr><th scope="col">Check</th><th scope="col" class="number">Figure</th><th scope="col">Verdict</th><th scope="col">What it means</th></tr></thead><tbody>${quality.map(
    (check) =>
      markup`<tr><th scope="row">${asWords(check.check)}</th><td class="number">${withUnit(check.figure, check.unit)}</td><td>${mark(check.verdict)}</td><td>${check.advice}</td></tr>`,
  )}</tbody></table></div></section>`;
}

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
