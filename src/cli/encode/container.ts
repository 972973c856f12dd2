import {
  type EncodedPacket,
  EncodedVideoPacketSource,
  FilePathTarget,
  MovOutputFormat,
  Mp4OutputFormat,
  Output,
  type OutputFormat,
  type VideoCodec,
  WebMOutputFormat,
} from "mediabunny";
import type { Rotation } from "./coded-picture.ts";

export type TimedContainer = "mp4" | "mov" | "webm";

/** What the container is to say of the pictures. */
export interface Timing {
  /** Presentation time of each frame in seconds, rising from 0. */
  readonly times_s: Float64Array;
  /** Ticks a second of the container's clock. */
  readonly ticks_per_s: number;
  readonly rotation: Rotation;
  /** Written as the recording's own tag of its capture rate, as phones do for slow motion. */
  readonly captureRate_hz: number | null;
}

/** A packet, and which picture in order of showing it holds. */
export interface PlacedPacket {
  readonly packet: EncodedPacket;
  readonly picture: number;
}

/** Name of the tag in which Android phones keep the capture rate. */
const captureRateTag = "com.android.capture.fps";

const formats: Readonly<Record<TimedContainer, () => OutputFormat>> = {
  mp4: () => new Mp4OutputFormat({ fastStart: false, metadataFormat: "mdta" }),
  mov: () => new MovOutputFormat({ fastStart: false, metadataFormat: "mdta" }),
  webm: () => new WebMOutputFormat(),
};

/**
 * Writes encoded pictures into a container, giving the n-th picture shown the n-th time. Packets keep their order, so
 * reordered pictures stay right, and go to disk as they come.
 */
export async function writeContainer(
  path: string,
  container: TimedContainer,
  timing: Timing,
  codec: VideoCodec,
  decoderConfig: VideoDecoderConfig,
  packets: AsyncIterable<PlacedPacket>,
): Promise<void> {
  const output = new Output({ format: formats[container](), target: new FilePathTarget(path) });
  const source = new EncodedVideoPacketSource(codec);
  output.addVideoTrack(source, { rotation: timing.rotation, frameRate: timing.ticks_per_s });
  if (timing.captureRate_hz !== null) {
    output.setMetadataTags({ raw: { [captureRateTag]: timing.captureRate_hz.toFixed(6) } });
  }
  await output.start();
  let written = 0;
  for await (const { packet, picture } of packets) {
    await source.add(retime(packet, timing.times_s, picture), written === 0 ? { decoderConfig } : undefined);
    written++;
  }
  if (written !== timing.times_s.length) {
    throw new Error(`the encoder wrote ${written} frames for ${timing.times_s.length}`);
  }
  await output.finalize();
}

function retime(packet: EncodedPacket, times_s: Float64Array, i: number): EncodedPacket {
  const timestamp = times_s[i];
  if (timestamp === undefined) throw new Error(`the encoder wrote a frame ${i} of ${times_s.length}`);
  const before = times_s[i - 1] ?? 0;
  const duration = i + 1 < times_s.length ? (times_s[i + 1] as number) - timestamp : timestamp - before;
  return packet.clone({ timestamp, duration });
}
