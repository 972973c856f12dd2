export type { SwarmDot } from "./charts/beeswarm.ts";
export { fittingSwarm } from "./charts/beeswarm.ts";
export { chartStyle, durationChart, pathsChart, speedChart } from "./charts/index.ts";
export type { MethodsText } from "./methods-text.ts";
export { methodsText } from "./methods-text.ts";
export { readable, readableAlone, withUncertainty } from "./numbers.ts";
export { asWords, many, share, shareRange } from "./page/words.ts";
export type { ResultFile } from "./result-files.ts";
export { resultFiles } from "./result-files.ts";
