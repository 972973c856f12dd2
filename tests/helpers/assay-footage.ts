import type { Assay } from "../../src/assay/index.ts";
import type { Footage } from "../../src/footage/index.ts";
import { throwIfStopped } from "../../src/quantities/index.ts";

/** Footage that plays an assay's frames as they are, with no codec between. */
export function assayFootage(assay: Assay, changes: { readonly frames?: number } = {}): Footage {
  const frames = changes.frames ?? assay.frames;
  const { width, height, times_s } = assay;
  // Making a picture costs more than looking at it, and some footage is read twice.
  const made: Uint8Array[] = [];
  const picture = (index: number) => {
    let luma = made[index];
    if (!luma) {
      luma = new Uint8Array(width * height);
      assay.render(index, luma);
      made[index] = luma;
    }
    return luma;
  };
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
      const repeatedFrames: number[] = [];
      let framesRead = 0;
      let stoppedEarly = false;
      for (let index = 0; index < frames && !stoppedEarly; index++) {
        throwIfStopped(signal);
        const luma = picture(index);
        if (index > 0 && Buffer.compare(luma, picture(index - 1)) === 0) repeatedFrames.push(index);
        framesRead++;
        stoppedEarly = receive({ index, t_s: times_s[index] as number, width, height, luma }) === "enough";
      }
      return { framesRead, stoppedEarly, repeatedFrames, warnings: [] };
    },
    close() {},
  };
}
