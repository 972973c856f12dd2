import { readFileSync } from "node:fs";
import { createRequire } from "node:module";
import type { CoreFactory, FfmpegCore } from "../wasm/core.ts";
import { FileReaderInNode } from "./path-as-blob.ts";

let loading: Promise<FfmpegCore> | undefined;

/** The ffmpeg core of this thread, loaded when first asked for. `anew` gives up the old one after a crash. */
export function loadCoreInNode(anew = false): Promise<FfmpegCore> {
  if (anew) loading = undefined;
  loading ??= load();
  return loading;
}

/**
 * The core is built for web workers alone: it is shown a worker's `self` and `location` while it starts. The reader of
 * files it looks up later, at every mount, so that one stays.
 */
async function load(): Promise<FfmpegCore> {
  const require = createRequire(import.meta.url);
  const world = globalThis as unknown as Record<string, unknown>;
  const before = { self: world.self, location: world.location };
  world.self = globalThis;
  world.location = { href: "file:///" };
  world.FileReaderSync ??= FileReaderInNode;
  try {
    const create = require("@ffmpeg/core") as CoreFactory;
    return await create({ wasmBinary: readFileSync(require.resolve("@ffmpeg/core/wasm")) });
  } finally {
    for (const [name, value] of Object.entries(before)) {
      if (value === undefined) delete world[name];
      else world[name] = value;
    }
  }
}
