import { EncodedPacketSink, type Input, type InputVideoTrack } from "mediabunny";
import type { Warning } from "../../quantities/index.ts";
import type { Bytes } from "../bytes.ts";
import { type EditList, editRule, libraryShift_s } from "../container/edit-list.ts";
import { isHidden, mayHidePictures } from "../container/hidden-pictures.ts";
import { isoExtent, readIsoMovie } from "../container/iso-movie.ts";
import { matroskaCutShort } from "../container/matroska-end.ts";
import { carriesSlowMotionMarks } from "../container/slow-motion-marks.ts";
import { type ContainerKind, containerName } from "../container/sniff.ts";
import type { Recording } from "../recording.ts";
import { nothingToRead, noVideoTrack } from "../refusals.ts";
import { captureRateFromTags } from "../time/capture-rate-tag.ts";
import { medianInterval, risingTimes } from "../time/intervals.ts";
import { pixelsNotSquare, severalTracks, slowMotionMarks } from "../warnings.ts";
import type { SampleSource } from "./sample-source.ts";

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
  const { cutShort, fragments } = iso
    ? await isoExtent(bytes)
    : { cutShort: await matroskaCutShort(bytes), fragments: false };
  if (iso && movie === null) throw nothingToRead(name, true);

  const track = await input.getPrimaryVideoTrack();
  if (track === null) throw cutShort ? nothingToRead(name, true) : noVideoTrack(name);
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

  const { first, ticks, end, packets, hidden } = await packetTimes(track, ticksOf, rule.keeps);
  if (ticks.length === 0) throw nothingToRead(name, cutShort);
  const interval = medianInterval(ticks);
  const tags = await input.getMetadataTags();
  const wholeLength_s = iso ? null : await track.getDurationFromMetadata();
  const head = await bytes.read(0, 512);
  return {
    track,
    decodable: (await track.getCodec()) !== null,
    ticksOf,
    packets,
    hidesPictures: hidden > 0,
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
      promised_s: cutShort && fragments ? null : Math.max((end - ticks[0]!) / ticksPerSecond, wholeLength_s ?? 0),
      warnings,
    },
  };
}

/** What the packets of a track tell. */
interface PacketTimes {
  /** Time of the first packet, whatever it holds. */
  readonly first: number;
  /** Rising times of the frames that belong to the recording, and the end of the last one, ticks. */
  readonly ticks: Float64Array;
  readonly end: number;
  readonly packets: number;
  readonly hidden: number;
}

async function packetTimes(
  track: InputVideoTrack,
  ticksOf: (timestamp_s: number) => number,
  keeps: (ticks: number) => boolean,
): Promise<PacketTimes> {
  const codec = await track.getCodec();
  const lookInside = mayHidePictures(codec);
  const times: number[] = [];
  let first: number | null = null;
  let end = 0;
  let packets = 0;
  let hidden = 0;
  const sink = new EncodedPacketSink(track);
  for await (const packet of sink.packets(undefined, undefined, { metadataOnly: !lookInside })) {
    packets++;
    const ticks = ticksOf(packet.timestamp);
    first ??= ticks;
    if (lookInside && isHidden(codec!, packet.data)) hidden++;
    else if (keeps(ticks)) {
      times.push(ticks);
      end = Math.max(end, ticksOf(packet.timestamp + packet.duration));
    }
  }
  return { first: first ?? 0, ticks: risingTimes(times), end, packets, hidden };
}

async function internalCodec(track: InputVideoTrack): Promise<string> {
  const id = await track.getInternalCodecId();
  return typeof id === "string" ? id.trim() : "unknown";
}
