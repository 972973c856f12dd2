import { availableParallelism } from "node:os";
import { type EncodedPacket, EncodedPacketSink, type VideoCodec } from "mediabunny";
import type { CodecContext, Frame } from "node-av";
import { type DecodedPicture, DecoderFailure } from "../decoder.ts";
import { LumaTightener } from "../picture/tight-luma.ts";
import { attempt, type PictureStream } from "../samples/pulled-decoder.ts";
import type { SampleSource } from "../samples/sample-source.ts";

/** The native codec library. */
export type CodecLibrary = typeof import("node-av");

/** Threads that decode ahead while a picture is measured; more only cost memory. */
const mostThreads = 4;

/** Pictures that may fail to decode after one packet: as many as can be held back. */
const mostBadAtOnce = 64;

/** Names of pixel formats whose first plane is luma; the number is the depth of the samples. */
const lumaFirst = /^(?:yuvj?a?4\d\dp|nv\d\d|gray)(\d+)?(?:le)?$/;

function codecId(library: CodecLibrary, codec: VideoCodec | null) {
  switch (codec) {
    case "avc":
      return library.AV_CODEC_ID_H264;
    case "hevc":
      return library.AV_CODEC_ID_HEVC;
    case "vp8":
      return library.AV_CODEC_ID_VP8;
    case "vp9":
      return library.AV_CODEC_ID_VP9;
    case "av1":
      return library.AV_CODEC_ID_AV1;
    default:
      return null;
  }
}

/**
 * Pictures from the native codec library, in software only: a graphics card would make results depend on the machine.
 * Its threads decode the packets they were sent while ours measures. Null when it doesn't know the codec.
 */
export async function nativePictures(library: CodecLibrary, source: SampleSource): Promise<PictureStream | null> {
  const id = codecId(library, await source.track.getCodec());
  const codec = id === null ? null : library.Codec.findDecoder(id);
  const config = await source.track.getDecoderConfig();
  if (id === null || codec === null || config === null) return null;

  async function openContext(): Promise<CodecContext> {
    const context = new library.CodecContext();
    context.allocContext3(codec);
    context.codecType = library.AVMEDIA_TYPE_VIDEO;
    context.codecId = id!;
    context.width = config!.codedWidth ?? 0;
    context.height = config!.codedHeight ?? 0;
    context.extraData = config!.description ? bufferOf(config!.description) : null;
    const options = library.Dictionary.fromObject({
      // Strict: pictures are held back as long as the stream may reorder them, even if it doesn't say how far.
      strict: `${library.FF_COMPLIANCE_STRICT}`,
      threads: `${Math.min(mostThreads, Math.max(2, availableParallelism()))}`,
    });
    const code = await context.open2(codec, options);
    if (code < 0) throw new DecoderFailure(`the codec doesn't open (${code})`);
    return context;
  }

  const tightener = new LumaTightener(true);

  function pictureOf(frame: Frame, ticks: number): DecodedPicture {
    const { width, height } = frame;
    const format = library.avGetPixFmtName(frame.format as Parameters<CodecLibrary["avGetPixFmtName"]>[0]) ?? "none";
    const depth = lumaFirst.exec(format);
    const bytes = frame.data?.[0];
    if (!depth || !bytes) throw new DecoderFailure(`the decoder gives ${format} pixels`);
    const bitDepth = Number(depth[1] ?? 8);
    const luma = tightener.tighten({ bytes, offset: 0, stride: frame.linesize[0]!, width, height, bitDepth });
    return { ticks, width, height, bitDepth, luma };
  }

  return async function* pictures(fromTicks, wants) {
    const sink = new EncodedPacketSink(source.track);
    const start = fromTicks === null ? null : await attempt(sink.getKeyPacket(source.timestampOf(fromTicks + 0.5)));
    const packets = sink.packets(start ?? undefined);
    const context = await openContext();
    const packet = new library.Packet();
    packet.alloc();
    const frame = new library.Frame();
    frame.alloc();

    /** Sends a packet (null: the end). One that can't be decoded is passed over, as ffmpeg does. */
    async function send(encoded: EncodedPacket | null): Promise<void> {
      if (encoded !== null) {
        packet.data = bufferOf(encoded.data);
        packet.pts = BigInt(source.ticksOf(encoded.timestamp));
        packet.isKeyframe = encoded.type === "key";
      }
      await context.sendPacket(encoded === null ? null : packet);
      packet.unref();
    }

    try {
      for (let done = false; !done; ) {
        const next = await attempt(packets.next());
        done = next.done === true;
        await send(next.done ? null : next.value);
        for (let bad = 0; ; ) {
          const code = await context.receiveFrame(frame);
          if (code === library.AVERROR_EAGAIN || code === library.AVERROR_EOF) break;
          if (code < 0) {
            if (++bad > mostBadAtOnce) throw new DecoderFailure(`the codec fails again and again (${code})`);
            continue;
          }
          const ticks = Number(frame.pts);
          if (wants(ticks)) yield pictureOf(frame, ticks);
          frame.unref();
        }
      }
    } finally {
      await packets.return();
      packet.free();
      frame.free();
      context.freeContext();
    }
  };
}

function bufferOf(data: ArrayBufferLike | ArrayBufferView): Buffer {
  return ArrayBuffer.isView(data) ? Buffer.from(data.buffer, data.byteOffset, data.byteLength) : Buffer.from(data);
}
