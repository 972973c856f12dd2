import type { CoreLoader, MountableFile } from "./core.ts";
import { askFfprobe } from "./run-core.ts";

/** A packet as the core's demuxer gives it, times in ticks of the track's clock. */
export interface ProbedPacket {
  readonly pts?: number;
  readonly dts?: number;
  readonly duration?: number;
}

/** What the core says of a video track. */
export interface Probe {
  readonly codec: string;
  /** As the core names it: `yuv420p`, `bgr24`. */
  readonly pixelFormat: string;
  readonly tick: { readonly numerator: number; readonly denominator: number };
  readonly pixelAspect: { readonly wide: number; readonly high: number };
  readonly packets: readonly ProbedPacket[];
}

/** What is to be asked. */
export interface ProbeQuestion {
  /** Which of the video tracks, counted from 0. */
  readonly track: number;
  /** Whether to list every packet, which reads the whole file, or the first one only. */
  readonly allPackets: boolean;
  /** Only for ISO base media files; the demuxers of others refuse the option. */
  readonly ignoreEditList: boolean;
}

interface Answer {
  readonly packets?: readonly ProbedPacket[];
  readonly streams?: readonly {
    readonly codec_name?: string;
    readonly pix_fmt?: string;
    readonly time_base?: string;
    readonly sample_aspect_ratio?: string;
  }[];
}

const shown = "stream=codec_name,pix_fmt,time_base,sample_aspect_ratio:packet=pts,dts,duration";

/**
 * Asks the core about a video track. Pictures put into a file as its cover are no video.
 * @returns null when the core finds no such track
 * @throws DecoderFailure when the core crashes
 */
export async function probeRecording(
  load: CoreLoader,
  file: MountableFile,
  { track, allPackets, ignoreEditList }: ProbeQuestion,
): Promise<Probe | null> {
  const answer = await askFfprobe(load, file, [
    ...(ignoreEditList ? ["-ignore_editlist", "1"] : []),
    ...["-select_streams", `V:${track}`, "-show_entries", shown, "-of", "json=c=1"],
    ...(allPackets ? [] : ["-read_intervals", "%+#1"]),
  ]);
  if (answer === null) return null;
  const { streams, packets } = JSON.parse(answer) as Answer;
  const stream = streams?.[0];
  if (!stream) return null;
  const [numerator = 1, denominator = 1] = numbers(stream.time_base, "/");
  const [wide = 1, high = 1] = numbers(stream.sample_aspect_ratio, ":");
  return {
    codec: stream.codec_name ?? "unknown",
    pixelFormat: stream.pix_fmt ?? "unknown",
    tick: { numerator, denominator },
    pixelAspect: wide > 0 && high > 0 ? { wide, high } : { wide: 1, high: 1 },
    packets: packets ?? [],
  };
}

const numbers = (text: string | undefined, between: string): number[] => text?.split(between).map(Number) ?? [];
