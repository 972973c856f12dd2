import type { WorkerSidePort } from "./contract/port.ts";
import { serveMeasure } from "./side/measure.ts";

serveMeasure(self as unknown as WorkerSidePort);
