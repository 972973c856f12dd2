import { chartStyle } from "../charts/index.ts";

/** The whole style of the report page: screen in light and dark, and paper (always light). */
export const pageStyle = `
:root {
  color-scheme: light;
  --paper: #ffffff; --ink: #1c2530; --quiet: #56616d; --line: #dfe4e8; --tint: #f3f6f8;
  --cell: #2b6cab; --mean: #b3430a; --good: #1b6e53; --fair: #8a5a00; --poor: #a61e2d;
  --chart-ink: var(--ink); --chart-quiet: var(--quiet); --chart-line: var(--line);
  --chart-cell: var(--cell); --chart-mean: var(--mean);
}
@media screen and (prefers-color-scheme: dark) {
  :root {
    color-scheme: dark;
    --paper: #12181f; --ink: #e6eaee; --quiet: #a0abb6; --line: #2c3742; --tint: #1a222b;
    --cell: #8cc4f7; --mean: #ff9b57; --good: #6fcfae; --fair: #e6b95c; --poor: #ff8f96; --chart-dot-opacity: .6;
  }
}
* { box-sizing: border-box; }
html { -webkit-text-size-adjust: 100%; text-size-adjust: 100%; }
body {
  margin: 0 auto; padding: 40px 28px 72px; max-width: 900px; background: var(--paper); color: var(--ink);
  font: 16px/1.55 ui-sans-serif, system-ui, "Segoe UI", Roboto, "Noto Sans", "DejaVu Sans", sans-serif;
}
h1, h2, .verdict { font-family: Charter, "Bitstream Charter", "Iowan Old Style", "Noto Serif", "DejaVu Serif", Georgia, serif; text-wrap: balance; }
h1 { margin: 0; font-size: 19px; line-height: 1.35; font-weight: 600; }
h2 { margin: 52px 0 12px; font-size: 21px; line-height: 1.3; font-weight: 600; }
p { margin: 0 0 12px; max-width: 70ch; text-wrap: pretty; }
.of { margin: 4px 0 0; color: var(--quiet); }
.of span + span::before { content: "·"; margin: 0 .5em; }
.verdict { margin: 26px 0 14px; max-width: 30em; font-size: 30px; line-height: 1.28; }
.verdict b { font-weight: 700; white-space: nowrap; }
.quiet, figcaption, .note { color: var(--quiet); }
.note { margin-top: 12px; font-size: 14px; }
.compact { width: auto; min-width: 340px; }
table { width: 100%; border-collapse: collapse; font-size: 15px; line-height: 1.45; font-variant-numeric: tabular-nums lining-nums; }
caption { text-align: left; color: var(--quiet); padding: 0 0 8px; }
th, td { padding: 8px 18px 8px 0; text-align: left; vertical-align: top; border-bottom: 1px solid var(--line); }
th:last-child, td:last-child { padding-right: 0; }
thead th { padding-top: 0; border-bottom-color: var(--quiet); color: var(--quiet); font-weight: 500; white-space: nowrap; }
tbody th { font-weight: 500; }
.number { text-align: right; white-space: nowrap; }
.figure { font-weight: 650; }
.checks tbody th { white-space: nowrap; }
.measure { width: 30%; }
figure { margin: 0 0 34px; break-inside: avoid; }
figcaption { margin: 8px 0 0; max-width: 75ch; font-size: 14px; text-wrap: pretty; }
.frame { overflow: hidden; border-radius: 4px; }
.key { display: flex; flex-wrap: wrap; gap: 4px 22px; margin: 0 0 8px; padding: 0; list-style: none; font-size: 14px; }
.key li { display: flex; align-items: center; gap: 8px; }
.key svg { width: 36px; height: 14px; background: #6b7680; border-radius: 3px; }
.mark { white-space: nowrap; font-weight: 600; }
.mark svg { width: 11px; height: 11px; margin-right: 7px; vertical-align: -1px; }
.good { color: var(--good); } .fair { color: var(--fair); } .poor { color: var(--poor); } .unknown { color: var(--quiet); }
.mark path, .mark circle { fill: none; stroke: currentColor; stroke-width: 1.6; }
.mark .full { fill: currentColor; }
.notices { max-width: 78ch; margin: 0; padding: 0; list-style: none; border-top: 1px solid var(--line); }
.notices li { padding: 9px 0 9px 16px; border-bottom: 1px solid var(--line); border-left: 3px solid var(--fair); overflow-wrap: anywhere; }
dl { display: grid; grid-template-columns: minmax(120px, max-content) minmax(0, 1fr); gap: 5px 22px; margin: 0 0 18px; font-size: 15px; }
dt { color: var(--quiet); } dd { margin: 0; overflow-wrap: anywhere; font-variant-numeric: tabular-nums lining-nums; }
.hash { font: 13px ui-monospace, "Cascadia Mono", "DejaVu Sans Mono", monospace; }
summary { cursor: pointer; color: var(--quiet); width: max-content; }
summary:focus-visible, .scroll:focus-visible { outline: 2px solid var(--cell); outline-offset: 3px; }
pre { margin: 10px 0 0; padding: 14px 16px; overflow-x: auto; border-radius: 4px; background: var(--tint); font: 12.5px/1.5 ui-monospace, "Cascadia Mono", "DejaVu Sans Mono", monospace; white-space: pre-wrap; overflow-wrap: anywhere; }
.references { margin: 16px 0 0; padding: 0; list-style: none; font-size: 14px; color: var(--quiet); }
.references li { padding-left: 1.6em; text-indent: -1.6em; margin-bottom: 4px; }
.safety { margin-top: 56px; padding-top: 14px; border-top: 1px solid var(--line); font-size: 14px; color: var(--quiet); }
.scroll { overflow-x: auto; }
@media (max-width: 640px) {
  body { padding: 24px 16px 48px; }
  .verdict { font-size: 24px; }
  .scroll table { min-width: 580px; }
  dl { grid-template-columns: minmax(0, 1fr); gap: 0; } dd { margin-bottom: 8px; }
}
@page { margin: 16mm 15mm 17mm; }
@media print {
  body { max-width: none; padding: 0; font-size: 10pt; }
  h1 { font-size: 11pt; } h2 { margin-top: 20pt; font-size: 13pt; break-after: avoid; } .verdict { font-size: 18pt; margin-top: 14pt; }
  table, dl, figcaption, .note, .key, .references, .safety { font-size: 9pt; }
  tr, li, dt, dd, .safety { break-inside: avoid; }
  thead { display: table-header-group; }
  .paths-figure { width: 82%; }
  pre { columns: 2; overflow: visible; font-size: 7pt; }
  * { print-color-adjust: exact; -webkit-print-color-adjust: exact; }
  .scroll { overflow: visible; }
  summary { list-style: none; break-after: avoid; }
  details::details-content { content-visibility: visible; block-size: auto; }
}
${chartStyle}`;
