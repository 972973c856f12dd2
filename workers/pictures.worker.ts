import type { WorkerSidePort } from "./contract/port.ts";
import { servePictures } from "./side/pictures.ts";

servePictures(self as unknown as WorkerSidePort);
