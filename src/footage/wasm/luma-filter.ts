/** Formats whose luma lies in a plane of its own, which is taken as it is. */
const planar = /^(yuv[aj]?\d{3}p|gray|ya8)/;

/** Formats that hold luma among chroma, and the planar format that keeps every sample of it. */
const regrouped: Readonly<Record<string, string>> = {
  yuyv422: "yuv422p",
  uyvy422: "yuv422p",
  yvyu422: "yuv422p",
  uyyvyy411: "yuv411p",
  nv12: "yuv420p",
  nv21: "yuv420p",
  nv16: "yuv422p",
  p010le: "yuv420p10le",
};

/**
 * The filter graph that gives the stored luma of pictures of this pixel format (as the core names it), code values
 * untouched; or RGB, of which luma is to be computed.
 */
export function lumaGraph(pixelFormat: string): string {
  if (planar.test(pixelFormat)) return "extractplanes=y";
  const target = regrouped[pixelFormat];
  return target === undefined ? "format=rgb24" : `format=${target},extractplanes=y`;
}

/** Depth of the samples of a grey format as the core names it (`gray`, `gray10le`), or null when it is not grey. */
export function greyDepth(format: string): number | null {
  const match = /^gray(\d+)?(le)?$/.exec(format);
  return match ? Number(match[1] ?? 8) : null;
}

/**
 * Luma of packed RGB, one byte a pixel: 0.299 R + 0.587 G + 0.114 B (ITU-R BT.601), full range, in whole numbers.
 * @param to receives `to.length` pixels
 */
export function lumaOfRgb(rgb: Uint8Array, to: Uint8Array): void {
  for (let i = 0, k = 0; i < to.length; i++, k += 3)
    to[i] = (77 * rgb[k]! + 150 * rgb[k + 1]! + 29 * rgb[k + 2]! + 128) >> 8;
}
