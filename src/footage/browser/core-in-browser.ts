/// <reference path="./ffmpeg-core.d.ts" />
import wasmUrl from "@ffmpeg/core/wasm?url";
import type { FfmpegCore } from "../wasm/core.ts";

let loading: Promise<FfmpegCore> | undefined;

/**
 * The ffmpeg core of this worker, fetched from our own origin when first asked for (31 MB). `anew` gives up the old one
 * after a crash.
 */
export function loadCoreInBrowser(anew = false): Promise<FfmpegCore> {
  if (anew) loading = undefined;
  loading ??= load();
  return loading;
}

async function load(): Promise<FfmpegCore> {
  const { default: createCore } = await import("@ffmpeg/core");
  // The only way the core takes an address: as JSON in base 64 behind the `#` of its script's address.
  const address = btoa(JSON.stringify({ wasmURL: new URL(wasmUrl, import.meta.url).href, workerURL: "" }));
  return createCore({ mainScriptUrlOrBlob: `#${address}` });
}
