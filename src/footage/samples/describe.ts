import { EncodedPacketSink, type Input, type InputVideoTrack } from "mediabunny";
import type { Warning } from "../../quantities/index.ts";
import type { Bytes } from "../bytes.ts";
import { type EditList, editRule, libraryShift_s } from "../container/edit-list.ts";
import { isoCutShort, readIsoMovie } from "../container/iso-movie.ts";
import { matroskaCutShort } from "../container/matroska-end.ts";
import { carriesSlowMotionMarks } from "../container/slow-motion-marks.ts";
import { type ContainerKind, containerName } from "../container/sniff.ts";
import type { Recording } from "../recording.ts";
import { nothingToRead, noVideoTrack } from "../refusals.ts";
import { captureRateFromTags } from "../time/capture-rate-tag.ts";
import { medianInterval, risingTimes } from "../time/intervals.ts";
import { pixelsNotSquare, severalTracks, slowMotionMarks } from "../warnings.ts";
import type { SampleSource } from "./samples-decoder.ts";

/** A recording described through the demuxing library, and the track to decode. */
export interface DescribedTrack extends SampleSource {
  readonly recording: Recording;
  /** Whether the demuxing library knows the codec; what it doesn't is for ffmpeg. */
  readonly decodable: boolean;
}

const noEdits: EditList = { edits: [], movieTimescale: 1, mediaTimescale: 1 };

/**
 * Describes an MP4, QuickTime, Matroska or WebM recording from its index and packet headers; no picture is decoded.
 * @throws InputError when there is no index or no video track
 */
export async function describeTrack(
  input: Input,
  bytes: Bytes,
  name: string,
  kind: ContainerKind,
): Promise<DescribedTrack> {
  const iso = kind === "iso-bmff";
  const movie = iso ? await readIsoMovie(bytes) : null;
  const cutShort = iso ? await isoCutShort(bytes) : await matroskaCutShort(bytes);
  if (iso && movie === null) throw nothingToRead(name, true);

  const track = await input.getPrimaryVideoTrack();
  if (track === null) throw cutShort && !iso ? nothingToRead(name, true) : noVideoTrack(name);
  const isoTrack = movie?.tracks.find(({ id }) => id === track.id);
  const ticksPerSecond = isoTrack?.timescale || (await track.getTimeResolution());
  const editList: EditList = isoTrack
    ? { edits: isoTrack.edits, movieTimescale: movie!.timescale, mediaTimescale: isoTrack.timescale }
    : noEdits;
  const shift_s = libraryShift_s(editList);
  const ticksOf = (timestamp_s: number) => Math.round((timestamp_s - shift_s) * ticksPerSecond);
  const rule = editRule(editList);

  const warnings: Warning[] = [...rule.warnings];
  const videoTracks = await input.getVideoTracks();
  if (videoTracks.length > 1) warnings.push(severalTracks(videoTracks.length, videoTracks.indexOf(track) + 1));
  const aspect = await track.getPixelAspectRatio();
  if (aspect.num !== aspect.den) warnings.push(pixelsNotSquare(aspect.num, aspect.den));
  const marks = iso && (await carriesSlowMotionMarks(bytes));
  if (marks) warnings.push(slowMotionMarks);

  const { first, ticks, end } = await packetTimes(track, ticksOf, rule.keeps);
  if (ticks.length === 0) throw nothingToRead(name, cutShort);
  const interval = medianInterval(ticks);
  const tags = await input.getMetadataTags();
  const wholeLength_s = iso ? null : await track.getDurationFromMetadata();
  const head = await bytes.read(0, 512);
  return {
    track,
    decodable: (await track.getCodec()) !== null,
    ticksOf,
    timestampOf: (ticks) => ticks / ticksPerSecond + shift_s,
    recording: {
      name,
      kind,
      container: containerName(kind, head),
      codec: (await track.getCodecParameterString()) ?? (await internalCodec(track)),
      track: videoTracks.indexOf(track),
      rotation_deg: await track.getRotation(),
      tick: { numerator: 1, denominator: ticksPerSecond },
      ticks,
      firstPacketTicks: first,
      keeps: rule.keeps,
      containerRate_hz: interval !== null && interval > 0 ? ticksPerSecond / interval : null,
      // Marked parts are stretched by the player only: the stored times are capture times, whatever the tag says.
      captureRateTag_hz: marks ? null : captureRateFromTags(tags.raw),
      cutShort,
      promised_s: Math.max((end - ticks[0]!) / ticksPerSecond, wholeLength_s ?? 0),
      warnings,
    },
  };
}

/** Times of the frames that belong to the recording, in order, and the end of the last one, ticks. */
async function packetTimes(
  track: InputVideoTrack,
  ticksOf: (timestamp_s: number) => number,
  keeps: (ticks: number) => boolean,
): Promise<{ first: number; ticks: Float64Array; end: number }> {
  const times: number[] = [];
  let first: number | null = null;
  let end = 0;
  for await (const packet of new EncodedPacketSink(track).packets(undefined, undefined, { metadataOnly: true })) {
    const ticks = ticksOf(packet.timestamp);
    first ??= ticks;
    if (!keeps(ticks)) continue;
    times.push(ticks);
    end = Math.max(end, ticksOf(packet.timestamp + packet.duration));
  }
  return { first: first ?? 0, ticks: risingTimes(times), end };
}

async function internalCodec(track: InputVideoTrack): Promise<string> {
  const id = await track.getInternalCodecId();
  return typeof id === "string" ? id.trim() : "unknown";
}
