import {
  type EncodedPacket,
  EncodedPacketSink,
  EncodedVideoPacketSource,
  FilePathSource,
  FilePathTarget,
  Input,
  MATROSKA,
  MovOutputFormat,
  MP4,
  Mp4OutputFormat,
  Output,
  type OutputFormat,
  WEBM,
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

/** Name of the tag in which Android phones keep the capture rate. */
const captureRateTag = "com.android.capture.fps";

const formats: Readonly<Record<TimedContainer, () => OutputFormat>> = {
  mp4: () => new Mp4OutputFormat({ fastStart: false, metadataFormat: "mdta" }),
  mov: () => new MovOutputFormat({ fastStart: false, metadataFormat: "mdta" }),
  webm: () => new WebMOutputFormat(),
};

/**
 * Copies the packets of an evenly timed recording into a new container, giving the n-th picture shown the n-th time.
 * Nothing is decoded; packets keep their order, so reordered pictures stay right.
 */
export async function remux(
  fromPath: string,
  toPath: string,
  container: TimedContainer,
  timing: Timing,
): Promise<void> {
  const input = new Input({ formats: [MP4, MATROSKA, WEBM], source: new FilePathSource(fromPath) });
  try {
    const track = await input.getPrimaryVideoTrack();
    const config = await track?.getDecoderConfig();
    const codec = track?.codec;
    if (!track || !config || !codec) throw new Error("the encoder wrote no video track");
    const sink = new EncodedPacketSink(track);
    const shown = await presentationTimes(sink);
    const { times_s } = timing;
    if (shown.length !== times_s.length) {
      throw new Error(`the encoder wrote ${shown.length} frames for ${times_s.length}`);
    }
    const rank = new Map(shown.map((t, i) => [t, i]));
    const output = new Output({ format: formats[container](), target: new FilePathTarget(toPath) });
    const source = new EncodedVideoPacketSource(codec);
    output.addVideoTrack(source, { rotation: timing.rotation, frameRate: timing.ticks_per_s });
    if (timing.captureRate_hz !== null) {
      output.setMetadataTags({ raw: { [captureRateTag]: timing.captureRate_hz.toFixed(6) } });
    }
    await output.start();
    let first = true;
    for await (const packet of sink.packets()) {
      const i = rank.get(packet.timestamp) as number;
      const retimed = retime(packet, times_s, i);
      await source.add(retimed, first ? { decoderConfig: config } : undefined);
      first = false;
    }
    await output.finalize();
  } finally {
    input.dispose();
  }
}

async function presentationTimes(sink: EncodedPacketSink): Promise<number[]> {
  const shown: number[] = [];
  for await (const packet of sink.packets(undefined, undefined, { metadataOnly: true })) shown.push(packet.timestamp);
  return shown.sort((a, b) => a - b);
}

function retime(packet: EncodedPacket, times_s: Float64Array, i: number): EncodedPacket {
  const timestamp = times_s[i] as number;
  const before = times_s[i - 1] ?? 0;
  const duration = i + 1 < times_s.length ? (times_s[i + 1] as number) - timestamp : timestamp - before;
  return packet.clone({ timestamp, duration });
}
