export { analyseMotion, type Motion } from "./analyse-motion.ts";
export { defaultMotionSettings, type MotionSettings } from "./settings.ts";
