import { zlibSync } from "fflate";

/**
 * A grey picture, one byte a pixel, as PNG (ISO/IEC 15948): colour type 0, eight bits, every row filtered by Paeth's
 * predictor, which suits the smooth backgrounds of microscopy.
 */
export function greyPng(width: number, height: number, grey: Uint8Array): Uint8Array {
  const header = new Uint8Array(13);
  new DataView(header.buffer).setUint32(0, width);
  new DataView(header.buffer).setUint32(4, height);
  header[8] = 8;
  const pieces = [
    Uint8Array.of(0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a),
    chunk("IHDR", header),
    chunk("IDAT", zlibSync(filtered(width, height, grey), { level: 9 })),
    chunk("IEND", new Uint8Array(0)),
  ];
  const png = new Uint8Array(pieces.reduce((length, piece) => length + piece.length, 0));
  let at = 0;
  for (const piece of pieces) {
    png.set(piece, at);
    at += piece.length;
  }
  return png;
}

function filtered(width: number, height: number, grey: Uint8Array): Uint8Array {
  const out = new Uint8Array(height * (width + 1));
  for (let y = 0; y < height; y++) {
    const row = y * width;
    const to = y * (width + 1);
    out[to] = 4;
    for (let x = 0; x < width; x++) {
      const left = x > 0 ? grey[row + x - 1]! : 0;
      const above = y > 0 ? grey[row + x - width]! : 0;
      const corner = x > 0 && y > 0 ? grey[row + x - width - 1]! : 0;
      out[to + 1 + x] = grey[row + x]! - paeth(left, above, corner);
    }
  }
  return out;
}

function paeth(left: number, above: number, corner: number): number {
  const guess = left + above - corner;
  const toLeft = Math.abs(guess - left);
  const toAbove = Math.abs(guess - above);
  const toCorner = Math.abs(guess - corner);
  if (toLeft <= toAbove && toLeft <= toCorner) return left;
  return toAbove <= toCorner ? above : corner;
}

function chunk(type: string, data: Uint8Array): Uint8Array {
  const out = new Uint8Array(data.length + 12);
  const view = new DataView(out.buffer);
  view.setUint32(0, data.length);
  for (let i = 0; i < 4; i++) out[4 + i] = type.charCodeAt(i);
  out.set(data, 8);
  view.setUint32(data.length + 8, crc32(out.subarray(4, data.length + 8)));
  return out;
}

/** The check sum of PNG chunks (CRC-32 of ISO 3309). */
export function crc32(bytes: Uint8Array): number {
  let crc = 0xffffffff;
  for (const byte of bytes) {
    crc ^= byte;
    for (let bit = 0; bit < 8; bit++) crc = (crc >>> 1) ^ (crc & 1 ? 0xedb88320 : 0);
  }
  return (crc ^ 0xffffffff) >>> 0;
}
