import { type FootageFacts, openInBrowser, openPictures, type ReadReport } from "../../../src/footage/browser/index.ts";
import { InputError } from "../../../src/quantities/index.ts";
import { fingerprint } from "../../helpers/fingerprint.ts";

export interface Task {
  readonly file: File;
  readonly decoder: "auto" | "native" | "wasm";
  /** Frames to look at, in this order; null to read all from the first. */
  readonly look: readonly number[] | null;
}

export interface Outcome {
  readonly facts?: FootageFacts;
  readonly report?: ReadReport;
  readonly times_s: readonly number[];
  readonly fingerprints: readonly number[];
  /** Code of the InputError that stopped it. */
  readonly refused?: string;
}

self.onmessage = async ({ data }: MessageEvent<Task>) => {
  try {
    self.postMessage(await work(data));
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    self.postMessage({ times_s: [], fingerprints: [], refused: error.code } satisfies Outcome);
  }
};

async function work({ file, decoder, look }: Task): Promise<Outcome> {
  const times_s: number[] = [];
  const fingerprints: number[] = [];
  if (look === null) {
    const footage = await openInBrowser(file, { decoder });
    const report = await footage.read(({ t_s, luma }) => {
      times_s.push(t_s);
      fingerprints.push(fingerprint(luma));
      return "more";
    });
    footage.close();
    return { facts: footage.facts, report, times_s, fingerprints };
  }
  const pictures = await openPictures(file, { decoder });
  for (const index of look) {
    const picture = await pictures.picture(index);
    times_s.push(picture?.t_s ?? -1);
    fingerprints.push(picture ? fingerprint(picture.luma) : 0);
  }
  pictures.close();
  return { facts: pictures.facts, times_s, fingerprints };
}
