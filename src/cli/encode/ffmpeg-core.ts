import { readFileSync } from "node:fs";
import { createRequire } from "node:module";

/** An open file of the core's own file system. */
export interface CoreStream {
  position: number;
}

/** What a device of the core's file system answers to; positions and lengths are bytes. */
export interface CoreDevice {
  open(stream: CoreStream): void;
  close(stream: CoreStream): void;
  read(stream: CoreStream, buffer: Uint8Array, offset: number, length: number, position: number): number;
  write(stream: CoreStream, buffer: Uint8Array, offset: number, length: number, position: number): number;
  llseek(stream: CoreStream, offset: number, whence: number): number;
}

/** The part of the ffmpeg core (ffmpeg compiled to WebAssembly) that encoding uses. */
export interface FfmpegCore {
  /** Runs ffmpeg to its end without letting go of the thread; returns its exit code. */
  exec(...args: string[]): number;
  setLogger(logger: (line: { readonly type: string; readonly message: string }) => void): void;
  readonly FS: {
    makedev(major: number, minor: number): number;
    registerDevice(device: number, operations: CoreDevice): void;
    mkdev(path: string, device: number): void;
    readonly ErrnoError: new (code: number) => Error;
  };
}

/**
 * Loads the ffmpeg core in Node. It is built for web workers alone, so it is shown a worker's `self` and `location`
 * while it starts; both are taken away again.
 */
export async function loadFfmpegCore(): Promise<FfmpegCore> {
  const require = createRequire(import.meta.url);
  const world = globalThis as unknown as Record<string, unknown>;
  const before = { self: world.self, location: world.location };
  world.self = globalThis;
  world.location = { href: "file:///" };
  try {
    const create = require("@ffmpeg/core") as (module: { wasmBinary: Uint8Array }) => Promise<FfmpegCore>;
    return await create({ wasmBinary: readFileSync(require.resolve("@ffmpeg/core/wasm")) });
  } finally {
    for (const [name, value] of Object.entries(before)) {
      if (value === undefined) delete world[name];
      else world[name] = value;
    }
  }
}
