import { Input, Logging, LogLevel, MATROSKA, MP4, QTFF, type Source, WEBM } from "mediabunny";
import { InputError } from "../quantities/index.ts";
import type { Bytes } from "./bytes.ts";
import { type ContainerKind, sniffContainer } from "./container/sniff.ts";
import type { Decoder } from "./decoder.ts";
import { DecoderChoice, type DecoderMaker } from "./decoder-choice.ts";
import type { FootageSettings } from "./footage.ts";
import type { Opened } from "./opened.ts";
import { emptyFile, notAVideo, nothingToRead } from "./refusals.ts";
import { type DescribedTrack, describeTrack } from "./samples/describe.ts";
import type { SampleSource } from "./samples/sample-source.ts";
import type { CoreLoader, MountableFile } from "./wasm/core.ts";
import { describeByProbe } from "./wasm/describe-by-probe.ts";
import { probeRecording } from "./wasm/probe.ts";
import { wasmDecoder } from "./wasm/wasm-decoder.ts";

/** A file and the ways of decoding it where we run (Node or a browser's worker). */
export interface OpenableSource {
  readonly name: string;
  readonly bytes: Bytes;
  /** The same file for the demuxing library. */
  readonly source: Source;
  /** The fast decoder of this place; null when it isn't there. */
  readonly fast: (source: SampleSource) => Promise<Decoder | null>;
  /** The same file for ffmpeg in WebAssembly, and the way to load that. */
  readonly mountable: MountableFile;
  readonly loadCore: CoreLoader;
}

/** Tells what a file is by its content, describes it, and opens it with the best decoder that the settings allow. */
export async function openSource(file: OpenableSource, settings: FootageSettings): Promise<Opened> {
  const { name, bytes } = file;
  if (bytes.size === 0) throw emptyFile(name);
  const head = await bytes.read(0, 512);
  const kind = sniffContainer(head);
  if (kind === null) throw notAVideo(name);

  // What the demuxing library has to say is said in refusals and warnings of our own.
  Logging.level = LogLevel.Errors;
  const input = new Input({ formats: [MP4, QTFF, MATROSKA, WEBM], source: file.source });
  const close = () => input.dispose();
  const probe = () =>
    probeRecording(file.loadCore, file.mountable, { track: 0, allPackets: true, ignoreEditList: false });
  try {
    const described = kind === "iso-bmff" || kind === "matroska" ? await describe(input, file, kind) : null;
    const recording = described?.recording ?? (await describeByProbe(probe, bytes, name, kind));
    const only = settings.decoder === "auto" ? undefined : settings.decoder;
    const choice = await DecoderChoice.among(recording, makers(file, described, settings), only);
    return { recording, choice, settings, close };
  } catch (error) {
    close();
    throw error;
  }
}

/** Describes through the demuxing library. What it stumbles over is damaged: no times would be sure. */
async function describe(input: Input, { name, bytes }: OpenableSource, kind: ContainerKind): Promise<DescribedTrack> {
  try {
    return await describeTrack(input, bytes, name, kind);
  } catch (error) {
    if (error instanceof InputError) throw error;
    throw Object.assign(nothingToRead(name, false), { cause: error });
  }
}

function makers(file: OpenableSource, described: DescribedTrack | null, settings: FootageSettings): DecoderMaker[] {
  const wanted = settings.decoder ?? "auto";
  const ways: DecoderMaker[] = [];
  if (wanted !== "wasm" && described?.decodable) ways.push(() => file.fast(described));
  if (wanted !== "native") ways.push(async () => wasmDecoder(file.loadCore, file.mountable));
  return ways;
}
