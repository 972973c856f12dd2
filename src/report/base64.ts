const digits = "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/";

/** Bytes as base64 text (RFC 4648 §4), by neither DOM nor Node so that it is the same in both. */
export function base64(bytes: Uint8Array): string {
  const pieces: string[] = [];
  for (let i = 0; i < bytes.length; i += 3) {
    const left = bytes.length - i;
    const bits = (bytes[i]! << 16) | ((bytes[i + 1] ?? 0) << 8) | (bytes[i + 2] ?? 0);
    pieces.push(
      digits[bits >> 18]! +
        digits[(bits >> 12) & 63]! +
        (left > 1 ? digits[(bits >> 6) & 63]! : "=") +
        (left > 2 ? digits[bits & 63]! : "="),
    );
  }
  return pieces.join("");
}
