import { rmSync } from "node:fs";
import { codedPicture, type Rotation } from "./coded-picture.ts";
import { forgetCreationTime } from "./creation-time.ts";
import { offerHostFile, offerPictures } from "./devices.ts";
import { type FfmpegCore, loadFfmpegCore } from "./ffmpeg-core.ts";
import { remux, type TimedContainer } from "./remux.ts";

export type Codec = "h264" | "hevc" | "vp9" | "mjpeg";
export type Container = TimedContainer | "avi";

/** How a recording is to be encoded. */
export interface EncodeOptions {
  readonly codec: Codec;
  readonly container: Container;
  /** Constant rate factor (H.264 and HEVC 0 … 51, VP9 0 … 63); for Motion JPEG the quantiser, 1 … 31. Lower is better. */
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
  mjpeg: ["avi"],
};

const millisecond_hz = 1000;

/**
 * Encodes pictures with the ffmpeg core (real libx264, libx265, libvpx, mjpeg) and writes the recording to `path`.
 * Pictures are made while they are encoded and the output goes straight to disk: memory stays flat. Irregular times
 * are kept to the millisecond, regular ones exactly. The same pictures give the same bytes.
 * @throws Error when the core fails; its last words are in the message.
 */
export async function encodeRecording(
  pictures: Pictures,
  path: string,
  options: EncodeOptions,
  encoded?: (frames: number) => void,
): Promise<void> {
  const core = await loadFfmpegCore();
  const rate_hz = pictures.constantRate ? containerRate(pictures.containerTimes_s) : 30;
  if (options.container === "avi") {
    run(core, pictures, path, options, rate_hz, encoded);
    return;
  }
  const evenlyTimed = `${path}.evenly-timed`;
  try {
    run(core, pictures, evenlyTimed, options, rate_hz, encoded);
    await remux(evenlyTimed, path, options.container, {
      times_s: pictures.containerTimes_s,
      ticks_per_s: pictures.constantRate ? rate_hz : millisecond_hz,
      rotation: options.rotation,
      captureRate_hz: options.captureRateTag_hz,
    });
  } finally {
    rmSync(evenlyTimed, { force: true });
  }
  if (options.container !== "webm") forgetCreationTime(path);
}

function containerRate(times_s: Float64Array): number {
  const last = times_s.length - 1;
  if (last < 1) return 30;
  return Math.round((1e6 * last) / (times_s[last] as number)) / 1e6;
}

function run(
  core: FfmpegCore,
  pictures: Pictures,
  path: string,
  options: EncodeOptions,
  rate_hz: number,
  encoded?: (frames: number) => void,
): void {
  const { width, height } = pictures;
  const fullRange = options.codec === "mjpeg";
  const coded = codedPicture(width, height, options.rotation, fullRange);
  const upright = new Uint8Array(width * height);
  let frame = 0;
  offerPictures(core, "/pictures", coded.bytes, () => {
    if (frame === pictures.frames) return false;
    pictures.render(frame, upright);
    coded.take(upright);
    frame++;
    encoded?.(frame);
    return true;
  });
  const said: string[] = [];
  core.setLogger(({ message }) => said.push(message) > 20 && said.shift());
  const out = offerHostFile(core, "/recording", path);
  let code: number;
  try {
    const size = `${coded.width}x${coded.height}`;
    const pixels = fullRange ? "yuvj420p" : "yuv420p";
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

function codecArguments({ codec, crf, preset, keyframeEvery }: EncodeOptions): string[] {
  const keys = ["-g", `${keyframeEvery}`];
  switch (codec) {
    case "h264":
      return ["-c:v", "libx264", "-preset", preset, "-crf", `${crf}`, ...keys, "-pix_fmt", "yuv420p", "-f", "mp4"];
    case "hevc": {
      const quiet = [
        "-x265-params",
        "pools=none:frame-threads=1:wpp=0:pmode=0:pme=0:lookahead-slices=0:log-level=error:info=0",
        "-tag:v",
        "hvc1",
      ];
      return ["-c:v", "libx265", "-preset", preset, "-crf", `${crf}`, ...keys, ...quiet, "-f", "mp4"];
    }
    case "vp9": {
      const fast = ["-deadline", "realtime", "-cpu-used", "7", "-row-mt", "0"];
      return ["-c:v", "libvpx-vp9", "-b:v", "0", "-crf", `${crf}`, ...fast, ...keys, "-f", "matroska"];
    }
    case "mjpeg":
      return ["-c:v", "mjpeg", "-q:v", `${crf}`, "-pix_fmt", "yuvj420p", "-f", "avi"];
  }
}
