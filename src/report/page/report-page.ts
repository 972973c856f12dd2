import type { MeasuredTrial } from "../../quantities/index.ts";
import { type Markup, markup, Markup as Safe } from "../markup.ts";
import { chartsSection } from "./charts-section.ts";
import { figuresSection } from "./figures-section.ts";
import { pageStyle } from "./page-style.ts";
import { methodsSection, provenanceSection } from "./provenance-section.ts";
import { checksInWords, qualitySection, setAsideSection } from "./quality-section.ts";
import { verdict } from "./verdict.ts";

/** The page may show what is inside it and nothing else: no script, no request, no frame, no form. */
const policy = "default-src 'none'; style-src 'unsafe-inline'; img-src data:; base-uri 'none'; form-action 'none'";

/**
 * The whole report as one HTML page that needs nothing beside it: readable offline, printable on A4 and Letter, light
 * or dark as the reader's system is. All text from outside is escaped.
 */
export function reportPage(measured: MeasuredTrial): string {
  const heading = measured.trial ? `Trial ${measured.trial}` : `Recording ${measured.source.recording}`;
  return markup`<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta http-equiv="Content-Security-Policy" content="${policy}">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="referrer" content="no-referrer">
<title>${heading} – Lodewake</title>
<style>${new Safe(pageStyle)}</style>
</head>
<body>
<header><h1><bdi>${heading}</bdi></h1>${about(measured)}<p class="verdict">${verdict(measured)}</p>${footage(measured)}</header>
<main>
${warningsSection(measured)}
${figuresSection(measured)}
${chartsSection(measured)}
${qualitySection(measured)}
${setAsideSection(measured)}
${provenanceSection(measured)}
${methodsSection(measured)}
</main>
<footer class="safety">${safety}</footer>
</body>
</html>
`.text;
}

function about({ strain, culture, condition, source, trial }: MeasuredTrial): Markup {
  const facts = [
    strain && (["strain", strain] as const),
    culture && (["culture", culture] as const),
    condition && (["condition", condition] as const),
    trial && (["recording", source.recording] as const),
  ].filter((fact) => fact !== null && fact !== "" && fact !== undefined);
  return markup`<p class="of">${facts.map((fact) => fact && markup`<span>${fact[0]} <bdi>${fact[1]}</bdi></span>`)}</p>`;
}

function footage({ quality }: MeasuredTrial): Markup {
  return quality.length === 0 ? markup`` : markup`<p class="quiet">Footage: ${checksInWords(quality)}.</p>`;
}

function warningsSection({ warnings }: MeasuredTrial): Markup {
  if (warnings.length === 0) return markup``;
  const title = warnings.length === 1 ? "One warning" : `${warnings.length} warnings`;
  return markup`<section><h2>${title}</h2><ul class="notices">${warnings.map((it) => markup`<li><bdi>${it.message}</bdi></li>`)}</ul></section>`;
}

const safety = markup`<p>At the bench: strong magnets pinch fingers, wipe cards and disturb pacemakers and other implants; keep people who wear them away. Coils and the sample between them get hot; pause between runs. Treat live cultures as unknown microbes. Your institution’s own rules come first.</p>`;
