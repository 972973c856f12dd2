import { EncodedPacket } from "mediabunny";
import type { Codec } from "node-av";
import { InputError } from "../../quantities/index.ts";
import type { CodedPicture } from "./coded-picture.ts";
import type { PlacedPacket } from "./container.ts";

type CodecLibrary = typeof import("node-av");

/** Codecs whose encoders in the WebAssembly core don't work: they want threads, or reach out of its memory. */
export type NativeCodec = "hevc" | "vp9" | "av1";

interface NativeEncoder {
  readonly encoder: (library: CodecLibrary) => Codec | null;
  /** The codec as RFC 6381 writes it; profile and level as the encoder chooses them for these pictures. */
  readonly codecString: string;
  options(crf: number, preset: string): Record<string, string>;
}

const encoders: Readonly<Record<NativeCodec, NativeEncoder>> = {
  hevc: {
    encoder: (library) => library.Codec.findEncoderByName(library.FF_ENCODER_LIBX265),
    codecString: "hvc1.1.6.L120.90",
    options: (crf, preset) => ({
      preset,
      crf: `${crf}`,
      // One thread, and no banner with the library's version in the stream.
      "x265-params": "pools=none:frame-threads=1:wpp=0:lookahead-slices=0:log-level=error:info=0:repeat-headers=1",
    }),
  },
  vp9: {
    encoder: (library) => library.Codec.findEncoderByName(library.FF_ENCODER_LIBVPX_VP9),
    codecString: "vp09.00.31.08",
    options: (crf) => ({ b: "0", crf: `${crf}`, deadline: "realtime", "cpu-used": "7", threads: "1" }),
  },
  av1: {
    encoder: (library) => library.Codec.findEncoderByName(library.FF_ENCODER_LIBSVTAV1),
    codecString: "av01.0.08M.08",
    options: (crf) => ({ preset: "10", crf: `${crf}`, "svtav1-params": "lp=1" }),
  },
};

/** Loads the native codec library. @throws InputError when it isn't installed or doesn't load here */
async function loadLibrary(codec: NativeCodec): Promise<{ library: CodecLibrary; found: Codec }> {
  // SVT-AV1 would write its settings to standard error; it asks the environment how much to say (1: errors).
  process.env.SVT_LOG ??= "1";
  const library = await import("node-av").catch(() => null);
  const found = library && encoders[codec].encoder(library);
  library?.Log.setLevel(library.AV_LOG_ERROR);
  if (library && found) return { library, found };
  throw new InputError(
    "encoder-missing",
    `Encoding ${codec.toUpperCase()} needs the optional codec library, which isn't installed or doesn't load here.`,
    "--codec",
    "Choose h264 or mjpeg, or run npm install with optional dependencies.",
  );
}

/** What a container needs to know of the packets. */
export function nativeDecoderConfig(codec: NativeCodec, coded: CodedPicture): VideoDecoderConfig {
  return { codec: encoders[codec].codecString, codedWidth: coded.width, codedHeight: coded.height };
}

/**
 * Encodes pictures with the native codec library, one at a time.
 *
 * @param next lays the next picture into `coded` and answers true, or false when there is none
 * @throws InputError when the library isn't there
 */
export async function* nativePackets(
  codec: NativeCodec,
  coded: CodedPicture,
  options: { readonly crf: number; readonly preset: string; readonly keyframeEvery: number },
  next: () => boolean,
): AsyncGenerator<PlacedPacket> {
  const { library, found } = await loadLibrary(codec);
  const context = new library.CodecContext();
  const frame = new library.Frame();
  const packet = new library.Packet();
  const fine = (code: number, what: string) => {
    if (code < 0) throw new Error(`the ${codec} encoder stopped: ${what} (${code})`);
  };
  try {
    const format = library.AV_PIX_FMT_YUV420P;
    context.allocContext3(found);
    Object.assign(context, { width: coded.width, height: coded.height, pixelFormat: format });
    Object.assign(context, { timeBase: new library.Rational(1, 30), gopSize: options.keyframeEvery });
    context.framerate = new library.Rational(30, 1);
    const dictionary = library.Dictionary.fromObject(encoders[codec].options(options.crf, options.preset));
    fine(await context.open2(found, dictionary), "open");
    packet.alloc();
    frame.alloc();
    Object.assign(frame, { width: coded.width, height: coded.height, format });
    fine(frame.allocBuffer(), "buffer");
    for (let picture = 0, more = true; more; picture++) {
      more = next();
      if (more) {
        fine(frame.makeWritable(), "buffer");
        fine(frame.fromBuffer(Buffer.from(coded.bytes.buffer)), "picture");
        frame.pts = BigInt(picture);
      }
      fine(await context.sendFrame(more ? frame : null), "send");
      for (;;) {
        const code = await context.receivePacket(packet);
        if (code === library.AVERROR_EAGAIN || code === library.AVERROR_EOF) break;
        fine(code, "receive");
        const type = packet.isKeyframe ? "key" : "delta";
        yield { packet: new EncodedPacket(Uint8Array.from(packet.data!), type, 0, 0), picture: Number(packet.pts) };
        packet.unref();
      }
    }
  } finally {
    packet.free();
    frame.free();
    context.freeContext();
  }
}
