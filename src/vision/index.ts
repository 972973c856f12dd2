export { learnScene, type Scene } from "./scene.ts";
export { defaultVisionSettings, type VisionSettings } from "./settings.ts";
export { type FrameNote, Spotter } from "./spotter.ts";
export { type Sample, Survey } from "./survey.ts";
