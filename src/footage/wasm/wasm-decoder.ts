import { type AbortSignalLike, Stopped } from "../../quantities/index.ts";
import { type Decoder, DecoderFailure, type PictureTaker } from "../decoder.ts";
import type { Recording } from "../recording.ts";
import { type CoreLoader, coreName, type MountableFile } from "./core.ts";
import { lumaGraph } from "./luma-filter.ts";
import { PictureAssembler } from "./picture-assembler.ts";
import { PictureLog } from "./picture-log.ts";
import { type Probe, probeRecording } from "./probe.ts";
import { inputPath, picturesPath, runFfmpeg } from "./run-core.ts";

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

  return {
    name: coreName,
    async decode(recording, taker, signal) {
      const { pixelFormat, packets, tick } = await probe(recording);
      const log = new PictureLog();
      // The core's clock may start elsewhere than ours (times shifted to make them rise); the first packet tells.
      const perTick = (tick.numerator * recording.tick.denominator) / (tick.denominator * recording.tick.numerator);
      const first = packets[0]?.pts ?? packets[0]?.dts;
      const shift = first === undefined ? 0 : recording.firstPacketTicks - Math.round(first * perTick);
      const ticksOf = (pts: number) => {
        const { numerator, denominator } = log.clock;
        const ours = (pts * numerator * recording.tick.denominator) / (denominator * recording.tick.numerator);
        return Math.round(ours) + shift;
      };
      const pictures = new PictureAssembler(log, ticksOf, stoppable(taker, signal));
      const code = await runFfmpeg(
        load,
        file,
        argumentsFor(recording, pixelFormat),
        (bytes) => pictures.take(bytes),
        (line) => log.read(line),
      );
      if (pictures.thrown !== null) throw pictures.thrown.error;
      if (code !== 0 && !pictures.enough) throw new DecoderFailure(`ffmpeg ended with code ${code}`);
    },
    close() {},
  };
}

function argumentsFor({ kind, track }: Recording, pixelFormat: string): string[] {
  return [
    ...["-v", "info", "-hide_banner", "-nostats", "-noautorotate", "-copyts"],
    ...(kind === "iso-bmff" ? ["-ignore_editlist", "1"] : []),
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
