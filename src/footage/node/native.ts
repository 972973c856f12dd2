import type { Decoder } from "../decoder.ts";
import { type SampleSource, samplesDecoder } from "../samples/samples-decoder.ts";

let registered: Promise<string | null> | undefined;

/**
 * Registers the optional native decoder with the demuxing library, once, in software only (a graphics card would make
 * results depend on the machine). Gives the decoder's name, or null when it isn't installed or doesn't load here.
 */
function registerNative(): Promise<string | null> {
  registered ??= (async () => {
    try {
      const { registerMediabunnyServer } = await import("@mediabunny/server");
      registerMediabunnyServer({ hardwareContext: null });
      return `libavcodec ${await libraryVersion()} (native)`;
    } catch {
      return null;
    }
  })();
  return registered;
}

/** Version of the codec library within the native decoder; it belongs to a dependency's dependency. */
async function libraryVersion(): Promise<string> {
  const { getFFmpegInfo } = await import("node-av");
  return getFFmpegInfo().libraries.avcodec;
}

/** The native decoder for a track, or null when it is not installed. */
export async function nativeDecoder(source: SampleSource): Promise<Decoder | null> {
  const name = await registerNative();
  return name === null ? null : samplesDecoder(name, source);
}
