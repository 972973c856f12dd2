import type { Assay } from "../../src/assay/index.ts";
import type { Footage } from "../../src/footage/index.ts";
import { throwIfStopped } from "../../src/quantities/index.ts";

/** Footage that plays an assay's frames as they are, with no codec between. */
export function assayFootage(assay: Assay, changes: { readonly frames?: number } = {}): Footage {
  const frames = changes.frames ?? assay.frames;
  const { width, height, times_s } = assay;
  return {
    facts: {
      width,
      height,
      rotation_deg: 0,
      container: "mp4",
      codec: "none",
      framesExpected: frames,
      durationExpected_s: null,
      timeResolution_s: null,
      timeFactor: 1,
      timeFactorFrom: "none",
      decoder: "assay",
      bitDepth: 8,
    },
    async read(receive, signal) {
      const luma = new Uint8Array(width * height);
      const before = new Uint8Array(width * height);
      const repeatedFrames: number[] = [];
      let framesRead = 0;
      let stoppedEarly = false;
      for (let index = 0; index < frames && !stoppedEarly; index++) {
        throwIfStopped(signal);
        assay.render(index, luma);
        if (index > 0 && luma.every((v, i) => v === before[i])) repeatedFrames.push(index);
        before.set(luma);
        framesRead++;
        const appetite = receive({ index, t_s: times_s[index] as number, width, height, luma });
        stoppedEarly = appetite === "enough";
      }
      return { framesRead, stoppedEarly, repeatedFrames, warnings: [] };
    },
    close() {},
  };
}
