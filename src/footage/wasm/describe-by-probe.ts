import type { Bytes } from "../bytes.ts";
import { riffExtent } from "../container/riff-extent.ts";
import { type ContainerKind, containerName } from "../container/sniff.ts";
import type { Recording } from "../recording.ts";
import { nothingToRead, noVideoTrack } from "../refusals.ts";
import { medianInterval, risingTimes } from "../time/intervals.ts";
import { pixelsNotSquare } from "../warnings.ts";
import type { Probe } from "./probe.ts";

/**
 * Describes a recording of a container that only ffmpeg reads (AVI above all), from its packets.
 * @param probe asks the core for all packets of the first video track
 * @throws InputError when there is no video track, or nothing in it
 */
export async function describeByProbe(
  probe: () => Promise<Probe | null>,
  bytes: Bytes,
  name: string,
  kind: ContainerKind,
): Promise<Recording> {
  const { cutShort, frames } = kind === "avi" ? await riffExtent(bytes) : { cutShort: false, frames: null };
  const found = await probe();
  if (found === null) throw cutShort ? nothingToRead(name, true) : noVideoTrack(name);
  const { tick, pixelAspect, packets } = found;
  const times = packets.map(({ pts, dts }) => pts ?? dts).filter((time) => time !== undefined);
  if (times.length === 0) throw nothingToRead(name, cutShort);
  const ticks = risingTimes(times);
  const interval = medianInterval(ticks);
  const listed = ticks.at(-1)! - ticks[0]! + (interval ?? 0);
  const length = cutShort
    ? frames !== null && interval !== null
      ? Math.max(listed, frames * interval)
      : null
    : listed;
  return {
    name,
    kind,
    container: containerName(kind, await bytes.read(0, 512)),
    codec: found.codec,
    track: 0,
    rotation_deg: 0,
    tick,
    ticks,
    firstPacketTicks: times[0]!,
    keeps: () => true,
    containerRate_hz: interval !== null && interval > 0 ? tick.denominator / (interval * tick.numerator) : null,
    captureRateTag_hz: null,
    cutShort,
    promised_s: length === null ? null : (length * tick.numerator) / tick.denominator,
    warnings: pixelAspect.wide === pixelAspect.high ? [] : [pixelsNotSquare(pixelAspect.wide, pixelAspect.high)],
  };
}
