import { openPictures } from "../../src/footage/browser/pictures.ts";
import { failureOf } from "../contract/failure.ts";
import type { PicturesNews, PicturesOrder } from "../contract/pictures.ts";
import type { WorkerSidePort } from "../contract/port.ts";

type Opened = Awaited<ReturnType<typeof openPictures>>;

/** Makes the thread behind `port` a pictures worker: it opens one recording and shows frames of it on request. */
export function servePictures(port: WorkerSidePort): void {
  const say = (news: PicturesNews, transfer: Transferable[] = []) => port.postMessage(news, transfer);
  let opened: Opened | null = null;
  port.onmessage = async ({ data }: MessageEvent<PicturesOrder>) => {
    try {
      if (data.type === "open") {
        opened = await openPictures(data.recording, data.captureFps === null ? {} : { captureFps: data.captureFps });
        const { facts, times_s } = opened;
        const { width, height, decoder } = facts;
        say({ type: "opened", pictures: { width, height, decoder, times_s } });
      } else if (opened) {
        const bitmap = await opened.picture(data.frame);
        say({ type: "shown", frame: data.frame, bitmap }, [bitmap]);
      }
    } catch (error) {
      say({ type: "failed", failure: failureOf(error) });
    }
  };
  say({ type: "ready" });
}
