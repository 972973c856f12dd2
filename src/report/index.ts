export { chartStyle, durationChart, pathsChart, speedChart } from "./charts/index.ts";
export type { MethodsText } from "./methods-text.ts";
export { methodsText } from "./methods-text.ts";
export type { ResultFile } from "./result-files.ts";
export { resultFiles } from "./result-files.ts";
