import { closeSync, openSync, readSync, writeSync } from "node:fs";
import type { CoreDevice, FfmpegCore } from "./ffmpeg-core.ts";

/** Error numbers of the core's C library (WASI). */
const notSeekable = 70;
const invalid = 28;

const fromStart = 0;
const fromHere = 1;
const fromEnd = 2;

/** Minor numbers of the devices made so far, so that each is its own. */
let devices = 0;

function register(core: FfmpegCore, path: string, device: CoreDevice): void {
  const number = core.FS.makedev(64, devices++);
  core.FS.registerDevice(number, device);
  core.FS.mkdev(path, number);
}

/**
 * Gives the core a file whose content is made while it reads: `next` fills the buffer with the next picture, or
 * answers false when there is none. Nothing but the one buffer is ever held.
 */
export function offerPictures(core: FfmpegCore, path: string, picture: Uint8Array, next: () => boolean): void {
  let at = picture.length;
  register(core, path, {
    open() {},
    close() {},
    read(_stream, buffer, offset, length) {
      let done = 0;
      while (done < length) {
        if (at === picture.length) {
          if (!next()) break;
          at = 0;
        }
        const piece = picture.subarray(at, Math.min(picture.length, at + length - done));
        buffer.set(piece, offset + done);
        at += piece.length;
        done += piece.length;
      }
      return done;
    },
    write() {
      throw new core.FS.ErrnoError(invalid);
    },
    llseek() {
      throw new core.FS.ErrnoError(notSeekable);
    },
  });
}

/** Lets the core write (and seek in) a file of the host as if it were its own, so that output never piles up in memory. */
export function offerHostFile(core: FfmpegCore, path: string, hostPath: string): { close(): void } {
  const file = openSync(hostPath, "w+");
  let size = 0;
  register(core, path, {
    open() {},
    close() {},
    read: (_stream, buffer, offset, length, position) => readSync(file, buffer, offset, length, position),
    write(_stream, buffer, offset, length, position) {
      const written = writeSync(file, buffer, offset, length, position);
      size = Math.max(size, position + written);
      return written;
    },
    llseek(stream, offset, whence) {
      const bases = { [fromStart]: 0, [fromHere]: stream.position, [fromEnd]: size } as Record<number, number>;
      const to = (bases[whence] ?? Number.NaN) + offset;
      if (!(to >= 0)) throw new core.FS.ErrnoError(invalid);
      return to;
    },
  });
  return { close: () => closeSync(file) };
}
