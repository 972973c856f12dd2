export { chartStyle } from "./chart-style.ts";
export type { DurationChartInput, DurationPoint } from "./duration-chart.ts";
export { durationChart } from "./duration-chart.ts";
export { pathsChart } from "./paths-chart.ts";
export type { SpeedChartInput } from "./speed-chart.ts";
export { speedChart } from "./speed-chart.ts";
