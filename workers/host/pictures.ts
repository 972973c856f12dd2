import { errorOf } from "../contract/failure.ts";
import type { OpenedPictures, PicturesNews, PicturesOrder } from "../contract/pictures.ts";
import { LatestWanted } from "./latest-wanted.ts";

/** Who hears of a recording's pictures. */
export interface PicturesListener {
  opened(pictures: OpenedPictures): void;
  /**
   * A picture that was asked for, or a later one when asking was quicker than decoding. The
   * receiver closes it; it is null when the frame can't be decoded.
   */
  shown(frame: number, bitmap: ImageBitmap | null): void;
  failed(error: Error): void;
}

/** A recording opened for looking at, in a worker of its own. */
export interface PicturesWorker {
  /** Asks for a frame. When several are asked for before one comes, the last is worth most and the others are skipped. */
  show(frame: number): void;
  close(): void;
}

/** Opens a recording for looking at. */
export function openPictures(recording: File, captureFps: number | null, listener: PicturesListener): PicturesWorker {
  const worker = new Worker(new URL("../pictures.worker.ts", import.meta.url), { type: "module", name: "pictures" });
  const send = (order: PicturesOrder) => worker.postMessage(order);
  const wanted = new LatestWanted((frame) => send({ type: "show", frame }));
  let closed = false;
  const close = () => {
    closed = true;
    worker.terminate();
  };
  const fail = (error: Error) => {
    if (closed) return;
    close();
    listener.failed(error);
  };
  worker.onmessage = ({ data }: MessageEvent<PicturesNews>) => {
    if (closed) {
      if (data.type === "shown") data.bitmap?.close();
      return;
    }
    if (data.type === "ready") send({ type: "open", recording, captureFps });
    else if (data.type === "failed") fail(errorOf(data.failure));
    else if (data.type === "opened") {
      listener.opened(data.pictures);
      wanted.free();
    } else {
      listener.shown(data.frame, data.bitmap);
      wanted.free();
    }
  };
  worker.onerror = (event) => {
    event.preventDefault();
    fail(new Error(`The worker that decodes pictures broke down: ${event.message || "it could not be loaded"}.`));
  };
  return { show: (frame) => wanted.want(frame), close };
}
