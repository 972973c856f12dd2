import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import {
  AudioSample,
  AudioSampleSource,
  EncodedPacketSink,
  EncodedVideoPacketSource,
  FilePathSource,
  FilePathTarget,
  Input,
  MovOutputFormat,
  MP4,
  Mp4OutputFormat,
  Output,
} from "mediabunny";
import { type EncodeOptions, encodeRecording } from "../../src/cli/encode/index.ts";

/** A folder for clips that a test makes, and its removal. */
export class ClipFolder {
  readonly path = mkdtempSync(join(tmpdir(), "clips-"));

  at(name: string): string {
    return join(this.path, name);
  }

  remove(): void {
    rmSync(this.path, { recursive: true, force: true });
  }
}

/** What a clip shows and when. */
export interface ClipScene {
  readonly width: number;
  readonly height: number;
  readonly times_s: readonly number[];
  /** Whether the times are multiples of one interval, which the container then keeps exactly. */
  readonly constantRate: boolean;
  /** Which picture the n-th frame shows; the n-th by default. */
  readonly shows?: (frame: number) => number;
}

/** Times at `rate_hz`, each but the first moved by up to 8 ms, whole milliseconds, always the same. */
export function jitteredTimes(frames: number, rate_hz: number): number[] {
  return Array.from({ length: frames }, (_, i) => {
    const jitter_ms = i === 0 ? 0 : ((i * 7919) % 17) - 8;
    return (Math.round((1000 * i) / rate_hz) + jitter_ms) / 1000;
  });
}

export function evenTimes(frames: number, rate_hz: number): number[] {
  return Array.from({ length: frames }, (_, i) => i / rate_hz);
}

/**
 * Draws picture `shown`: an uneven ground with grain that is new in every picture, a bright disc that travels, and a
 * dark bar at the top edge, so that a wrong turn or a wrong picture shows.
 */
export function drawPicture(shown: number, width: number, height: number, out: Uint8Array): void {
  let grain = (shown + 1) * 2654435761;
  const x0 = 12 + ((shown * 3) % (width - 24));
  const y0 = height / 2 + 10 * Math.sin(shown / 5);
  for (let y = 0, i = 0; y < height; y++) {
    for (let x = 0; x < width; x++, i++) {
      grain = (Math.imul(grain, 1664525) + 1013904223) >>> 0;
      const ground = y < 6 ? 40 : 90 + (60 * x) / width;
      const disc = (x - x0) ** 2 + (y - y0) ** 2 < 36 ? 80 : 0;
      out[i] = ground + disc + (grain >>> 29);
    }
  }
}

const defaults: EncodeOptions = {
  codec: "h264",
  container: "mp4",
  crf: 20,
  preset: "veryfast",
  keyframeEvery: 12,
  rotation: 0,
  captureRateTag_hz: null,
};

/** Encodes a clip of a scene and returns its path. */
export async function makeClip(path: string, scene: ClipScene, options: Partial<EncodeOptions> = {}): Promise<string> {
  const { width, height, times_s, constantRate, shows = (frame: number) => frame } = scene;
  await encodeRecording(
    {
      frames: times_s.length,
      width,
      height,
      containerTimes_s: Float64Array.from(times_s),
      constantRate,
      render: (frame, out) => drawPicture(shows(frame), width, height, out),
    },
    path,
    { ...defaults, ...options },
  );
  return path;
}

/** Writes a QuickTime file with a tenth of a second of sound and no picture. */
export async function makeSoundOnly(path: string): Promise<void> {
  const output = new Output({ format: new MovOutputFormat(), target: new FilePathTarget(path) });
  const source = new AudioSampleSource({ codec: "pcm-s16" });
  output.addAudioTrack(source);
  await output.start();
  const data = Int16Array.from({ length: 800 }, (_, i) => 3000 * Math.sin(i / 3));
  const sample = new AudioSample({ data, format: "s16", numberOfChannels: 1, sampleRate: 8000, timestamp: 0 });
  await source.add(sample);
  sample.close();
  await output.finalize();
}

/** Copies an MP4's packets into one laid out otherwise: with its index in front, or in fragments. */
export async function layOut(from: string, to: string, fastStart: "in-memory" | "fragmented"): Promise<string> {
  const input = new Input({ formats: [MP4], source: new FilePathSource(from) });
  const track = await input.getPrimaryVideoTrack();
  const config = await track?.getDecoderConfig();
  if (!track?.codec || !config) throw new Error(`${from} has no video track`);
  const output = new Output({ format: new Mp4OutputFormat({ fastStart }), target: new FilePathTarget(to) });
  const source = new EncodedVideoPacketSource(track.codec);
  output.addVideoTrack(source, { rotation: track.rotation });
  await output.start();
  for await (const packet of new EncodedPacketSink(track).packets())
    await source.add(packet, { decoderConfig: config });
  await output.finalize();
  input.dispose();
  return to;
}

/** Keeps the first part of a file, as a broken copy does. */
export function cutFile(from: string, to: string, part: number): string {
  const bytes = readFileSync(from);
  writeFileSync(to, bytes.subarray(0, Math.floor(bytes.length * part)));
  return to;
}

/** An edit: how long, and from when on in the track's own time; null is a delay. */
export interface ClipEdit {
  readonly duration_s: number;
  readonly start_s: number | null;
  readonly rate?: number;
}

/** Writes an edit list into an MP4 whose index comes last and has one track and no such list yet. */
export function addEditList(from: string, to: string, edits: readonly ClipEdit[]): string {
  const bytes = readFileSync(from);
  const moov = boxAt(bytes, "moov", 0);
  const trak = boxAt(bytes, "trak", moov + 8);
  const tkhd = boxAt(bytes, "tkhd", trak + 8);
  const mdia = boxAt(bytes, "mdia", trak + 8);
  if (bytes.includes("edts", moov, "latin1")) throw new Error(`${from} has an edit list already`);
  const movie_hz = bytes.readUInt32BE(boxAt(bytes, "mvhd", moov + 8) + 20);
  const media_hz = bytes.readUInt32BE(boxAt(bytes, "mdhd", mdia + 8) + 20);
  const head = Buffer.alloc(24);
  head.writeUInt32BE(24 + 12 * edits.length, 0);
  head.write("edts", 4, "latin1");
  head.writeUInt32BE(16 + 12 * edits.length, 8);
  head.write("elst", 12, "latin1");
  head.writeUInt32BE(edits.length, 20);
  const entries = edits.map(({ duration_s, start_s, rate = 1 }) => {
    const entry = Buffer.alloc(12);
    entry.writeUInt32BE(Math.round(duration_s * movie_hz), 0);
    entry.writeInt32BE(start_s === null ? -1 : Math.round(start_s * media_hz), 4);
    entry.writeInt32BE(rate * 65536, 8);
    return entry;
  });
  const list = Buffer.concat([head, ...entries]);
  for (const at of [moov, trak]) bytes.writeUInt32BE(bytes.readUInt32BE(at) + list.length, at);
  const after = tkhd + bytes.readUInt32BE(tkhd);
  writeFileSync(to, Buffer.concat([bytes.subarray(0, after), list, bytes.subarray(after)]));
  return to;
}

/** Where the first box of a type among those from `start` on begins. */
function boxAt(bytes: Buffer, type: string, start: number): number {
  for (let at = start; at + 8 <= bytes.length; ) {
    if (bytes.toString("latin1", at + 4, at + 8) === type) return at;
    const size = bytes.readUInt32BE(at);
    at += size === 1 ? Number(bytes.readBigUInt64BE(at + 8)) : size;
  }
  throw new Error(`no ${type} box`);
}
