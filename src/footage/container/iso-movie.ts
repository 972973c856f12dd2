import type { Bytes } from "../bytes.ts";
import type { Edit } from "./edit-list.ts";

/** A track of an ISO base media (MP4, QuickTime) file, as far as its times are concerned. */
export interface IsoTrack {
  readonly id: number;
  /** `vide`, `soun`, `meta`, … */
  readonly handler: string;
  readonly timescale: number;
  readonly edits: readonly Edit[];
}

/** What we read of an ISO base media file ourselves. */
export interface IsoMovie {
  readonly timescale: number;
  readonly tracks: readonly IsoTrack[];
}

interface Box {
  readonly type: string;
  readonly start: number;
  readonly end: number;
  /** False when the box claims more bytes than its surroundings hold. */
  readonly whole: boolean;
}

/** Boxes within `[from, to)`. A size that makes no sense ends the walk. */
async function* boxes(bytes: Bytes, from: number, to: number): AsyncGenerator<Box> {
  let at = from;
  while (at + 8 <= to) {
    const head = await bytes.read(at, 16);
    if (head.length < 8) return;
    const view = new DataView(head.buffer, head.byteOffset, head.length);
    let size = view.getUint32(0);
    let header = 8;
    if (size === 1 && head.length >= 16) {
      size = Number(view.getBigUint64(8));
      header = 16;
    } else if (size === 0) size = to - at;
    if (size < header) return;
    const end = at + size;
    const type = String.fromCharCode(head[4]!, head[5]!, head[6]!, head[7]!);
    yield { type, start: at + header, end: Math.min(end, to), whole: end <= to };
    at = end;
  }
}

/** Longest leaf box that is read whole; real ones are tens of bytes, an edit list of 10 000 entries is 200 kB. */
const longestLeaf = 1 << 20;

async function leaf(bytes: Bytes, box: Box): Promise<DataView> {
  const data = await bytes.read(box.start, Math.min(box.end - box.start, longestLeaf));
  return new DataView(data.buffer, data.byteOffset, data.length);
}

/** Timescale of `mvhd` or `mdhd`: both lay out version, dates and timescale alike. */
function timescaleOf(view: DataView): number {
  const at = view.getUint8(0) === 1 ? 20 : 12;
  return at + 4 <= view.byteLength ? view.getUint32(at) : 0;
}

function editsOf(view: DataView): Edit[] {
  const long = view.getUint8(0) === 1;
  const size = long ? 20 : 12;
  const count = Math.min(view.getUint32(4), Math.floor((view.byteLength - 8) / size));
  return Array.from({ length: count }, (_, i) => {
    const at = 8 + i * size;
    return {
      duration: long ? Number(view.getBigUint64(at)) : view.getUint32(at),
      mediaTime: long ? Number(view.getBigInt64(at + 8)) : view.getInt32(at + 4),
      rate: view.getInt32(at + size - 4) / 65536,
    };
  });
}

async function readTrack(bytes: Bytes, trak: Box): Promise<IsoTrack> {
  const track = { id: 0, handler: "", timescale: 0, edits: [] as Edit[] };
  const within = async (parent: Box): Promise<void> => {
    for await (const box of boxes(bytes, parent.start, parent.end)) {
      if (box.type === "edts" || box.type === "mdia") await within(box);
      else if (box.type === "tkhd") {
        const view = await leaf(bytes, box);
        track.id = view.getUint32(view.getUint8(0) === 1 ? 20 : 12);
      } else if (box.type === "mdhd") track.timescale = timescaleOf(await leaf(bytes, box));
      else if (box.type === "hdlr" && parent.type === "mdia") {
        const view = await leaf(bytes, box);
        track.handler = String.fromCharCode(...[8, 9, 10, 11].map((i) => view.getUint8(i)));
      } else if (box.type === "elst") track.edits = editsOf(await leaf(bytes, box));
    }
  };
  await within(trak);
  return track;
}

/**
 * Reads the clocks and edit lists of an ISO base media file (ISO/IEC 14496-12). Only the few boxes concerned are
 * fetched. Returns null when there is no movie box: such a file was cut off before its index was written.
 */
export async function readIsoMovie(bytes: Bytes): Promise<IsoMovie | null> {
  for await (const top of boxes(bytes, 0, bytes.size)) {
    if (top.type !== "moov") continue;
    let timescale = 0;
    const tracks: IsoTrack[] = [];
    for await (const box of boxes(bytes, top.start, top.end)) {
      if (box.type === "mvhd") timescale = timescaleOf(await leaf(bytes, box));
      else if (box.type === "trak") tracks.push(await readTrack(bytes, box));
    }
    return { timescale, tracks };
  }
  return null;
}

/** Boxes whose loss is a loss of recording; makers append things of their own after them. */
const substance = new Set(["moov", "moof", "mdat"]);

/** How far an ISO base media file reaches. */
export interface IsoExtent {
  /** Whether it ends before a box of media or index does. */
  readonly cutShort: boolean;
  /** Whether it consists of fragments, so that its index doesn't know of those that are missing. */
  readonly fragments: boolean;
}

/** Looks at the outermost boxes of an ISO base media file. */
export async function isoExtent(bytes: Bytes): Promise<IsoExtent> {
  let fragments = false;
  for await (const box of boxes(bytes, 0, bytes.size)) {
    fragments ||= box.type === "moof";
    if (!box.whole && substance.has(box.type)) return { cutShort: true, fragments };
  }
  return { cutShort: false, fragments };
}
