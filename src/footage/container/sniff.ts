/** Family of containers, as far as the first bytes tell. */
export type ContainerKind = "iso-bmff" | "matroska" | "avi" | "other video";

const text = (bytes: Uint8Array, at: number, length: number): string =>
  String.fromCharCode(...bytes.subarray(at, at + length));

const startsWith = (bytes: Uint8Array, signature: readonly number[]): boolean =>
  signature.every((byte, i) => bytes[i] === byte);

/** Boxes that may open an ISO base media or QuickTime file; old QuickTime has no `ftyp`. */
const firstBoxes = new Set(["ftyp", "moov", "mdat", "wide", "free", "skip", "pnot", "styp"]);

const ebml = [0x1a, 0x45, 0xdf, 0xa3];
const asf = [0x30, 0x26, 0xb2, 0x75, 0x8e, 0x66, 0xcf, 0x11];
const flv = [0x46, 0x4c, 0x56, 0x01];
const programStream = [0x00, 0x00, 0x01, 0xba];
const elementaryVideo = [0x00, 0x00, 0x01, 0xb3];

/** Packets of a transport stream are 188 bytes, each begun by 0x47; camcorders put 4 more before each. */
function isTransportStream(bytes: Uint8Array): boolean {
  const every = (offset: number, step: number) =>
    [0, 1, 2].every((packet) => bytes[offset + packet * step] === 0x47) && bytes.length > offset + 2 * step;
  return every(0, 188) || every(4, 192);
}

/**
 * Tells the container from its first bytes (512 are enough), never from the file's name.
 * Returns null when they belong to no video container we know.
 */
export function sniffContainer(bytes: Uint8Array): ContainerKind | null {
  if (bytes.length >= 8 && firstBoxes.has(text(bytes, 4, 4))) return "iso-bmff";
  if (startsWith(bytes, ebml)) return "matroska";
  if (text(bytes, 0, 4) === "RIFF" && text(bytes, 8, 4) === "AVI ") return "avi";
  if ([asf, flv, programStream, elementaryVideo].some((signature) => startsWith(bytes, signature)))
    return "other video";
  if (text(bytes, 0, 4) === "OggS" || isTransportStream(bytes)) return "other video";
  return null;
}

/**
 * The container's name as standards have it: `mp4`, `mov`, `3gp`, `webm`, `mkv`, `avi`, or for the rest what the
 * first bytes say of the family.
 */
export function containerName(kind: ContainerKind, bytes: Uint8Array): string {
  if (kind === "avi") return "avi";
  if (kind === "matroska") return text(bytes, 0, Math.min(bytes.length, 64)).includes("webm") ? "webm" : "mkv";
  if (kind === "iso-bmff") {
    if (text(bytes, 4, 4) !== "ftyp") return "mov";
    const brand = text(bytes, 8, 4);
    return brand === "qt  " ? "mov" : brand.startsWith("3g") ? "3gp" : "mp4";
  }
  return "other";
}
