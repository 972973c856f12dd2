import type { WorkerSidePort } from "./contract/port.ts";
import { serveResults } from "./side/results.ts";

serveResults(self as unknown as WorkerSidePort);
