export type { Footage, FootageFacts, FootageSettings, ReadReport } from "./footage.ts";
