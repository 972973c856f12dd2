export type { FootageEvidence } from "./evidence.ts";
export { judgeFootage } from "./judge-footage.ts";
