/** Codecs that may store pictures which are never shown and only serve to predict others. */
const hiding = new Set(["vp8", "vp9"]);

/** Whether packets of this codec (as the demuxing library names it) have to be looked into for hidden pictures. */
export const mayHidePictures = (codec: string | null): boolean => codec !== null && hiding.has(codec);

/**
 * Whether a VP8 or VP9 packet holds no picture to be shown, by the first bits of its header (RFC 6386, section 9.1; VP9
 * Bitstream Specification 0.6, sections 6.1 and 6.2 and annex B).
 */
export function isHidden(codec: string, data: Uint8Array): boolean {
  const first = data[0] ?? 0;
  if (codec === "vp8") return ((first >> 4) & 1) === 0;
  // A superframe, known by its last byte, ends with a picture that is shown.
  if (((data.at(-1) ?? 0) & 0xe0) === 0xc0) return false;
  const profile = ((first >> 5) & 1) | ((first >> 3) & 2);
  // Profile 3 has a reserved bit before: show_existing_frame, frame_type, show_frame.
  const flags = profile === 3 ? first : first >> 1;
  const showsExisting = (flags >> 2) & 1;
  const shows = flags & 1;
  return showsExisting === 0 && shows === 0;
}
