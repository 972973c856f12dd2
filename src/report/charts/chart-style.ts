/**
 * Style of all charts. Colours are variables that a page may set; the fallbacks are for light paper. Motile and not
 * motile differ by line style as well as by hue (orange and blue, which every common colour vision keeps apart).
 */
export const chartStyle = `
.lw-chart { display: block; width: 100%; height: auto; font: 13px ui-sans-serif, system-ui, "Segoe UI", Roboto, "Noto Sans", "DejaVu Sans", sans-serif; }
.lw-chart text { fill: var(--chart-ink, #1c2530); }
.lw-chart .lw-number { fill: var(--chart-quiet, #56616d); font-size: 12px; font-variant-numeric: tabular-nums; }
.lw-chart .lw-label { fill: var(--chart-quiet, #56616d); }
.lw-axis, .lw-tick { stroke: var(--chart-quiet, #56616d); stroke-width: 1; }
.lw-grid { stroke: var(--chart-line, #dfe4e8); stroke-width: 1; }
.lw-dot { fill: var(--chart-cell, #2b6cab); fill-opacity: var(--chart-dot-opacity, .42); }
.lw-bar { stroke: var(--chart-cell, #2b6cab); stroke-opacity: .45; stroke-width: 1; }
.lw-mean { fill: var(--chart-mean, #b3430a); }
.lw-interval { stroke: var(--chart-mean, #b3430a); stroke-width: 3; stroke-linecap: round; }
.lw-mean-line { stroke: var(--chart-mean, #b3430a); stroke-width: 1.5; stroke-dasharray: 1 4; stroke-linecap: round; }
.lw-mean-band { fill: var(--chart-mean, #b3430a); fill-opacity: .13; }
.lw-chart .lw-mean-text { fill: var(--chart-mean, #b3430a); font-weight: 600; }
.lw-path { fill: none; stroke-linejoin: round; stroke-linecap: round; }
.lw-casing { stroke: #10161c; stroke-opacity: .55; stroke-width: 3.2; }
.lw-motile { stroke: #ffa62b; stroke-width: 1.7; }
.lw-still { stroke: #8fd0ff; stroke-width: 1.7; stroke-dasharray: 1.5 3; }
.lw-unsure { stroke: #f2f2f2; stroke-width: 1.3; stroke-dasharray: 5 3; }
.lw-head { fill: #ffa62b; stroke: #10161c; stroke-width: .8; }
.lw-circle { fill: none; stroke: #f2f2f2; stroke-opacity: .7; stroke-width: 1; stroke-dasharray: 2 4; }
.lw-plate { fill: #10161c; fill-opacity: .78; }
.lw-scale-bar { stroke: #ffffff; stroke-width: 3; }
.lw-chart .lw-on-picture { fill: #ffffff; font-weight: 600; }
`;
