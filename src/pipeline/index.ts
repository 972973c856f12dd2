export { type MeasurePorts, measureTrial } from "./measure-trial.ts";
export { defaultMeasureSettings, type MeasureSettings } from "./settings.ts";
