import { openPictures, type Picture, type Pictures } from "../../src/footage/browser/index.ts";
import { failureOf } from "../contract/failure.ts";
import type { PicturesNews, PicturesOrder } from "../contract/pictures.ts";
import type { WorkerSidePort } from "../contract/port.ts";

/** Makes the thread behind `port` a pictures worker: it opens one recording and shows frames of it on request. */
export function servePictures(port: WorkerSidePort): void {
  const say = (news: PicturesNews, transfer: Transferable[] = []) => port.postMessage(news, transfer);
  let opened: Pictures | null = null;
  port.onmessage = async ({ data }: MessageEvent<PicturesOrder>) => {
    try {
      if (data.type === "open") {
        opened = await openPictures(data.recording, data.captureFps === null ? {} : { captureFps: data.captureFps });
        const { facts, times_s } = opened;
        say({
          type: "opened",
          pictures: { width: facts.width, height: facts.height, decoder: facts.decoder, times_s },
        });
      } else if (opened) {
        const { frame } = data;
        const picture = frame < opened.times_s.length ? await opened.picture(frame) : null;
        const bitmap = picture && (await bitmapOf(picture));
        say({ type: "shown", frame, bitmap }, bitmap ? [bitmap] : []);
      }
    } catch (error) {
      say({ type: "failed", failure: failureOf(error) });
    }
  };
  say({ type: "ready" });
}

/** Grey levels as they were decoded, opaque. */
function bitmapOf({ width, height, luma }: Picture): Promise<ImageBitmap> {
  const image = new ImageData(width, height);
  // Red, green, blue and alpha of a pixel as one number: the same whichever way round the machine keeps its bytes,
  // but for alpha, which little-endian machines (all that run browsers) keep last.
  const pixels = new Uint32Array(image.data.buffer);
  for (let i = 0; i < pixels.length; i++) pixels[i] = 0xff000000 | (luma[i]! * 0x010101);
  return createImageBitmap(image);
}
