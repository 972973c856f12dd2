import type { Footage } from "../../src/footage/index.ts";
import { defaultMeasureSettings, measureTrial } from "../../src/pipeline/index.ts";
import { bareTrial } from "../../src/trial/index.ts";

/** One timed run over a recording. */
export interface Timed {
  readonly frames: number;
  readonly seconds: number;
}

/** Decodes every frame and does nothing with it. */
export async function decodeOnly(open: () => Promise<Footage>): Promise<Timed> {
  const start = performance.now();
  const footage = await open();
  const { framesRead } = await footage.read(() => "more");
  footage.close();
  return { frames: framesRead, seconds: (performance.now() - start) / 1000 };
}

/** The whole measurement, but for the writing of files. */
export async function measureAll(open: () => Promise<Footage>, name: string): Promise<Timed> {
  const start = performance.now();
  const footage = await open();
  const recording = { name, sha256: "0".repeat(64) };
  const tool = { name: "bench", version: "0" };
  const measured = await measureTrial(bareTrial(name), { footage, recording, tool }, defaultMeasureSettings, {});
  footage.close();
  return { frames: measured.source.frames, seconds: (performance.now() - start) / 1000 };
}
