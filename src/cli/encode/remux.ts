import { EncodedPacketSink, FilePathSource, Input, MATROSKA, MP4, WEBM } from "mediabunny";
import { type PlacedPacket, type TimedContainer, type Timing, writeContainer } from "./container.ts";

/**
 * Copies the packets of an evenly timed recording into a new container with times of its own. Nothing is decoded.
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
    await writeContainer(toPath, container, timing, codec, config, placed(new EncodedPacketSink(track)));
  } finally {
    input.dispose();
  }
}

async function* placed(sink: EncodedPacketSink): AsyncGenerator<PlacedPacket> {
  const shown: number[] = [];
  for await (const packet of sink.packets(undefined, undefined, { metadataOnly: true })) shown.push(packet.timestamp);
  const rank = new Map(shown.sort((a, b) => a - b).map((t, i) => [t, i]));
  for await (const packet of sink.packets()) yield { packet, picture: rank.get(packet.timestamp) as number };
}
