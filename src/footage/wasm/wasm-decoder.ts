import { type AbortSignalLike, Stopped } from "../../quantities/index.ts";
import { type DecodedPicture, type Decoder, DecoderFailure, type PictureTaker } from "../decoder.ts";
import type { Recording } from "../recording.ts";
import { type CoreLoader, coreName, type MountableFile } from "./core.ts";
import { CoreClock } from "./core-clock.ts";
import { lumaGraph } from "./luma-filter.ts";
import { PictureAssembler } from "./picture-assembler.ts";
import { PictureLog } from "./picture-log.ts";
import { type Probe, probeRecording } from "./probe.ts";
import { inputPath, picturesPath, runFfmpeg } from "./run-core.ts";

/** Luma that `walk` decodes at a time, since the core can't be halted between pictures. */
const window_bytes = 24e6;

/**
 * Decodes with ffmpeg compiled to WebAssembly. The recording is read in pieces and luma streams out picture by picture,
 * so memory doesn't grow with length; but the thread is busy from the first picture to the last.
 */
export function wasmDecoder(load: CoreLoader, file: MountableFile): Decoder {
  let probed: Probe | null = null;

  async function probe(recording: Recording): Promise<Probe> {
    const { track, kind } = recording;
    probed ??= await probeRecording(load, file, { track, allPackets: false, ignoreEditList: kind === "iso-bmff" });
    if (probed === null) throw new DecoderFailure("the core finds no video track");
    return probed;
  }

  /** @param fromTicks time to seek to, a key picture at or before it; null to begin at the beginning */
  async function run(recording: Recording, taker: PictureTaker, fromTicks: number | null): Promise<void> {
    const found = await probe(recording);
    const clock = new CoreClock(recording, found);
    const log = new PictureLog();
    const pictures = new PictureAssembler(log, (pts) => clock.ticksOf(pts, log.clock), taker);
    const code = await runFfmpeg(
      load,
      file,
      argumentsFor(recording, found.pixelFormat, fromTicks === null ? null : clock.coreTime_s(fromTicks)),
      (bytes) => pictures.take(bytes),
      (line) => log.read(line),
    );
    if (pictures.thrown !== null) throw pictures.thrown.error;
    if (code !== 0 && !pictures.enough) throw new DecoderFailure(`ffmpeg ended with code ${code}`);
  }

  /** Copies of the pictures from a time on, as many as make up a window. */
  async function windowFrom(recording: Recording, fromTicks: number, seek: boolean): Promise<DecodedPicture[]> {
    const window: DecodedPicture[] = [];
    let bytes = 0;
    await run(
      recording,
      {
        wants: (ticks) => ticks >= fromTicks && recording.keeps(ticks),
        take(picture) {
          window.push({ ...picture, luma: picture.luma.slice() });
          bytes += picture.luma.length;
          return bytes < window_bytes ? "more" : "enough";
        },
      },
      seek ? fromTicks : null,
    );
    return window;
  }

  return {
    name: coreName,
    decode: (recording, taker, signal) => run(recording, stoppable(taker, signal), null),
    async *walk(recording, fromTicks) {
      const { ticks } = recording;
      for (let next = ticks.find((time) => time >= fromTicks); next !== undefined; ) {
        let window = next > ticks[0]! ? await windowFrom(recording, next, true) : [];
        // Not every container seeks well: what was overshot is reached from the beginning.
        if (window[0]?.ticks !== next) window = await windowFrom(recording, next, false);
        yield* window;
        const last = window.at(-1);
        if (last === undefined) return;
        next = ticks.find((time) => time > last.ticks);
      }
    },
  };
}

function argumentsFor({ kind, track }: Recording, pixelFormat: string, seekTo_s: number | null): string[] {
  return [
    ...["-v", "info", "-hide_banner", "-nostats", "-noautorotate", "-copyts"],
    ...(kind === "iso-bmff" ? ["-ignore_editlist", "1"] : []),
    ...(seekTo_s === null ? [] : ["-seek_timestamp", "1", "-noaccurate_seek", "-ss", seekTo_s.toFixed(6)]),
    ...["-i", inputPath, "-map", `0:V:${track}`, "-an", "-sn", "-dn", "-fps_mode", "passthrough"],
    ...["-vf", `${lumaGraph(pixelFormat)},showinfo=checksum=0`, "-f", "rawvideo", picturesPath],
  ];
}

/** The taker, with a look at the signal before each picture. */
function stoppable(taker: PictureTaker, signal: AbortSignalLike | undefined): PictureTaker {
  if (signal === undefined) return taker;
  return {
    wants(ticks) {
      if (signal.aborted) throw new Stopped();
      return taker.wants(ticks);
    },
    take: (picture) => taker.take(picture),
  };
}
