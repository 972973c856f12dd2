import type { DecodedPicture } from "./decoder.ts";
import { DecoderFailure } from "./decoder.ts";
import type { FootageFacts } from "./footage.ts";
import { clockOf, factsOf, type Opened } from "./opened.ts";
import { standUpright } from "./picture/upright.ts";
import { seconds } from "./recording.ts";

/** One frame to look at: upright luma, one byte a pixel, in memory of its own. */
export interface Picture {
  readonly index: number;
  readonly t_s: number;
  readonly width: number;
  readonly height: number;
  readonly luma: Uint8Array;
}

/**
 * The frames of a recording in any order, for looking at. Numbers and times are those of reading it from the first
 * frame, as long as every frame can be decoded.
 *
 * A frame near the last one asked for costs one decoding or none; a frame elsewhere costs the way from the key frame
 * before it. With ffmpeg in WebAssembly frames come in windows of 24 MB of luma, and each window costs that way anew.
 */
export interface Pictures {
  readonly facts: FootageFacts;
  /** Capture time of every frame, seconds from the first. */
  readonly times_s: Float64Array;
  /**
   * Gives a frame by its number; null when it can't be decoded.
   * @throws RangeError when there is no such frame
   */
  picture(index: number): Promise<Picture | null>;
  close(): void;
}

/** Luma that is kept at hand for going back and forth. */
const kept_bytes = 96e6;

/** Frames that are decoded in passing rather than sought anew. */
const stride_frames = 40;

/** Frames decoded before the wanted one when going backwards, for the next steps back. */
const runUp_frames = 20;

/** Makes an opened recording one to look around in. */
export function picturesOf(opened: Opened): Pictures {
  const { recording, choice } = opened;
  const { ticks } = recording;
  const clock = clockOf(opened);
  const times_s = ticks.map((time) => seconds(recording, time - ticks[0]!) * clock.factor);
  const cache = new Map<number, Picture>();
  let walk: AsyncGenerator<DecodedPicture, void, undefined> | null = null;
  let next = 0;
  let last = 0;
  let queue: Promise<unknown> = Promise.resolve();

  function keep(picture: DecodedPicture): number {
    const index = indexAt(ticks, picture.ticks);
    // Cached pictures are handed out as they are, so each has memory of its own.
    const { width, height, luma } = standUpright(picture, recording.rotation_deg, new Uint8Array(picture.luma.length));
    cache.delete(index);
    cache.set(index, { index, t_s: times_s[index]!, width, height, luma });
    const most = Math.max(runUp_frames + 2, Math.floor(kept_bytes / luma.length));
    for (const oldest of cache.keys()) {
      if (cache.size <= most) break;
      cache.delete(oldest);
    }
    return index;
  }

  async function walkTo(index: number): Promise<void> {
    if (walk === null || index < next || index - next > stride_frames) {
      await walk?.return();
      next = index < last ? Math.max(0, index - runUp_frames) : index;
      walk = choice.decoder.walk(recording, ticks[next]!);
    }
    while (next <= index) {
      const step = await walk.next();
      if (step.done) {
        walk = null;
        return;
      }
      next = keep(step.value) + 1;
    }
  }

  async function find(index: number): Promise<Picture | null> {
    for (;;) {
      const known = cache.get(index);
      if (known) return known;
      try {
        await walkTo(index);
        return cache.get(index) ?? null;
      } catch (error) {
        walk = null;
        if (!(error instanceof DecoderFailure) || !(await choice.another(error))) throw error;
      } finally {
        last = index;
      }
    }
  }

  return {
    get facts() {
      return factsOf(opened);
    },
    times_s,
    picture(index) {
      if (!(Number.isInteger(index) && index >= 0 && index < ticks.length))
        return Promise.reject(new RangeError(`there is no frame ${index} among ${ticks.length}`));
      const found = queue.then(() => find(index));
      queue = found.catch(() => {});
      return found;
    },
    close() {
      queue = queue.then(() => walk?.return()).then(opened.close);
    },
  };
}

/** Place of a time among rising times; of the one before it when it isn't there. */
function indexAt(ticks: Float64Array, time: number): number {
  let low = 0;
  let high = ticks.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if (ticks[middle]! <= time) low = middle;
    else high = middle - 1;
  }
  return low;
}
