/** Key under which Android phones keep the rate at which the sensor was read (QuickTime `mdta` metadata). */
const captureRateKey = "com.android.capture.fps";

function rateOf(value: unknown): number | null {
  if (value instanceof Uint8Array) {
    const view = new DataView(value.buffer, value.byteOffset, value.byteLength);
    if (view.byteLength === 4) return view.getFloat32(0);
    if (view.byteLength === 8) return view.getFloat64(0);
    return rateOf(new TextDecoder().decode(value));
  }
  if (Array.isArray(value)) return rateOf(value[0]);
  if (typeof value === "string") return value.trim() === "" ? null : Number(value);
  return typeof value === "number" ? value : null;
}

/**
 * The capture rate a phone wrote into its recording, frames per second, or null. The tag is a big-endian float in
 * untouched recordings and a decimal string in copies that an editor made.
 */
export function captureRateFromTags(tags: Readonly<Record<string, unknown>> | undefined): number | null {
  const rate = rateOf(tags?.[captureRateKey]);
  return rate !== null && Number.isFinite(rate) && rate > 0 ? rate : null;
}
