import { rmSync } from "node:fs";
import { type CodedPicture, codedPicture, type Rotation } from "./coded-picture.ts";
import { type TimedContainer, type Timing, writeContainer } from "./container.ts";
import { forgetCreationTime } from "./creation-time.ts";
import { offerHostFile, offerPictures } from "./devices.ts";
import { type FfmpegCore, loadFfmpegCore } from "./ffmpeg-core.ts";
import { type NativeCodec, nativeDecoderConfig, nativePackets } from "./native.ts";
import { remux } from "./remux.ts";

/** Codecs the WebAssembly core encodes. */
type CoreCodec = "h264" | "mjpeg";
export type Codec = CoreCodec | NativeCodec;
export type Container = TimedContainer | "avi";

/** How a recording is to be encoded. */
export interface EncodeOptions {
  readonly codec: Codec;
  readonly container: Container;
  /** Constant rate factor (H.264 and HEVC 0 … 51, VP9 and AV1 0 … 63); for Motion JPEG the quantiser, 1 … 31. Lower is better. */
  readonly crf: number;
  /** Speed preset of libx264 and libx265. */
  readonly preset: string;
  /** Most frames between key frames. */
  readonly keyframeEvery: number;
  readonly rotation: Rotation;
  /** Say the capture rate in the recording's own tag, as phones do for slow motion. Null: don't. */
  readonly captureRateTag_hz: number | null;
}

/** Pictures to be encoded: upright luma on request, and the time the container is to give each. */
export interface Pictures {
  readonly frames: number;
  readonly width: number;
  readonly height: number;
  readonly containerTimes_s: Float64Array;
  readonly constantRate: boolean;
  render(frame: number, out: Uint8Array): void;
}

/** Containers each codec is put into. */
export const containersOf: Readonly<Record<Codec, readonly Container[]>> = {
  h264: ["mp4", "mov"],
  hevc: ["mp4", "mov"],
  vp9: ["webm", "mp4"],
  av1: ["mp4", "webm"],
  mjpeg: ["avi"],
};

const millisecond_hz = 1000;

/**
 * Encodes pictures and writes the recording to `path`: H.264 and Motion JPEG with the ffmpeg core (real libx264 and
 * mjpeg in WebAssembly), HEVC, VP9 and AV1 with the optional native codec library. Pictures are made while they
 * are encoded and the output goes straight to disk: memory stays flat. Irregular times are kept to the millisecond,
 * regular ones exactly; AVI keeps no times. The same pictures give the same bytes (with the native library: the same build
 * of it).
 * @throws InputError when the native library is needed and not there
 * @throws Error when an encoder fails; its last words are in the message
 */
export async function encodeRecording(
  pictures: Pictures,
  path: string,
  options: EncodeOptions,
  encoded?: (frames: number) => void,
): Promise<void> {
  const { codec, container } = options;
  const rate_hz = pictures.constantRate ? containerRate(pictures.containerTimes_s) : 30;
  const coded = codedPicture(pictures.width, pictures.height, options.rotation, codec === "mjpeg");
  const next = feeder(pictures, coded, encoded);
  const timing: Timing = {
    times_s: pictures.containerTimes_s,
    ticks_per_s: pictures.constantRate ? rate_hz : millisecond_hz,
    rotation: options.rotation,
    captureRate_hz: options.captureRateTag_hz,
  };
  if (codec !== "h264" && codec !== "mjpeg") {
    if (container === "avi") throw new Error(`${codec} can't be put into AVI`);
    const packets = nativePackets(codec, coded, options, next);
    await writeContainer(path, container, timing, codec, nativeDecoderConfig(codec, coded), packets);
  } else {
    const core = await loadFfmpegCore();
    if (container === "avi") return run(core, coded, next, path, { ...options, codec }, rate_hz);
    const evenlyTimed = `${path}.evenly-timed`;
    try {
      run(core, coded, next, evenlyTimed, { ...options, codec }, rate_hz);
      await remux(evenlyTimed, path, container, timing);
    } finally {
      rmSync(evenlyTimed, { force: true });
    }
  }
  if (container !== "webm") forgetCreationTime(path);
}

/** Lays one picture after the other into `coded`; answers false when there is none left. */
function feeder(pictures: Pictures, coded: CodedPicture, encoded?: (frames: number) => void): () => boolean {
  const upright = new Uint8Array(pictures.width * pictures.height);
  let frame = 0;
  return () => {
    if (frame === pictures.frames) return false;
    pictures.render(frame, upright);
    coded.take(upright);
    frame++;
    encoded?.(frame);
    return true;
  };
}

function containerRate(times_s: Float64Array): number {
  const last = times_s.length - 1;
  if (last < 1) return 30;
  return Math.round((1e6 * last) / (times_s[last] as number)) / 1e6;
}

function run(
  core: FfmpegCore,
  coded: CodedPicture,
  next: () => boolean,
  path: string,
  options: EncodeOptions & { readonly codec: CoreCodec },
  rate_hz: number,
): void {
  offerPictures(core, "/pictures", coded.bytes, next);
  const said: string[] = [];
  core.setLogger(({ message }) => said.push(message) > 20 && said.shift());
  const out = offerHostFile(core, "/recording", path);
  let code: number;
  try {
    const size = `${coded.width}x${coded.height}`;
    const pixels = options.codec === "mjpeg" ? "yuvj420p" : "yuv420p";
    code = core.exec(
      ...["-hide_banner", "-nostats", "-f", "rawvideo", "-pix_fmt", pixels, "-s", size, "-r", `${rate_hz}`],
      ...["-i", "/pictures", "-an", "-fflags", "+bitexact", "-flags:v", "+bitexact"],
      ...codecArguments(options),
      "/recording",
    );
  } finally {
    out.close();
  }
  if (code !== 0) throw new Error(`the encoder stopped with code ${code}: ${said.slice(-4).join(" / ")}`);
}

function codecArguments(options: EncodeOptions & { readonly codec: CoreCodec }): string[] {
  const { codec, crf, preset, keyframeEvery } = options;
  const keys = ["-g", `${keyframeEvery}`];
  switch (codec) {
    case "h264":
      return ["-c:v", "libx264", "-preset", preset, "-crf", `${crf}`, ...keys, "-pix_fmt", "yuv420p", "-f", "mp4"];
    case "mjpeg":
      return ["-c:v", "mjpeg", "-q:v", `${crf}`, "-pix_fmt", "yuvj420p", "-f", "avi"];
  }
}
