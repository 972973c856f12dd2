import { type Kernels, mostPeaks, sortingNetwork, stackSize } from "./kernels.ts";
import { kernelsBase64 } from "./kernels.wasm.ts";
import { WebAssembly } from "./webassembly.ts";

interface Exports {
  whiten(luma: number, background: number, inverse: number, out: number, n: number, gain: number, offset: number): void;
  whitenLevels(
    level: number,
    background: number,
    inverse: number,
    out: number,
    n: number,
    gain: number,
    offset: number,
  ): void;
  halve(luma: number, out: number, width: number, height: number): void;
  blurRows(src: number, out: number, width: number, height: number, taps: number, radius: number): void;
  blurColumns(src: number, out: number, width: number, height: number, taps: number, radius: number): void;
  peaks(src: number, width: number, height: number, sign: number, threshold: number, out: number, most: number): number;
  sortStack(
    planes: number,
    network: number,
    comparators: number,
    scratch: number,
    n: number,
    lowRank: number,
    highRank: number,
    lower: number,
    upper: number,
    middle: number,
    spread: number,
  ): void;
  shifted(src: number, out: number, width: number, height: number, dx: number, dy: number): void;
}

const pageBytes = 65_536;
/** Kept free at the bottom for what the compiled module puts there itself. */
const reserved = 4096;

/**
 * The kernels in WebAssembly SIMD, with one fixed memory of at least `capacity` bytes for the planes. Returns null
 * where the engine has no SIMD. The memory never grows, so that views of it stay good.
 */
export function simdKernels(capacity: number): Kernels | null {
  const own = reserved + mostPeaks * 4 + 65_536;
  const pages = Math.ceil((capacity + own) / pageBytes);
  const memory = new WebAssembly.Memory({ initial: pages, maximum: 16_384 });
  let wasm: Exports;
  try {
    const module = new WebAssembly.Module(decodeBase64(kernelsBase64));
    wasm = new WebAssembly.Instance(module, { env: { memory } }).exports as unknown as Exports;
  } catch {
    return null;
  }

  let next = reserved;
  const take = (bytes: number): number => {
    const at = next;
    // One spare vector after each plane: the last block of a row may be read past its end.
    next += Math.ceil(bytes / 16) * 16 + 16;
    if (next > pages * pageBytes) throw new Error(`kernel memory of ${pages * pageBytes} bytes is used up`);
    return at;
  };
  const bytes = (n: number) => new Uint8Array(memory.buffer, take(n), n);
  const floats = (n: number) => new Float32Array(memory.buffer, take(n * 4), n);
  const at = (a: Uint8Array | Float32Array): number => {
    if (a.buffer !== memory.buffer) throw new Error("array is not in kernel memory");
    return a.byteOffset;
  };

  const network = sortingNetwork();
  const networkAt = bytes(network.length);
  networkAt.set(network);
  const pointers = new Uint32Array(memory.buffer, take(stackSize * 4), stackSize);
  const scratch = bytes(stackSize * 16);
  const tapsAt = floats(256);
  const found = new Int32Array(memory.buffer, take(mostPeaks * 4), mostPeaks);

  return {
    kind: "simd",
    bytes,
    floats,
    whiten(luma, background, inverse, out, gain, offset) {
      wasm.whiten(at(luma), at(background), at(inverse), at(out), out.length, gain, offset);
    },
    whitenLevels(level, background, inverse, out, gain, offset) {
      wasm.whitenLevels(at(level), at(background), at(inverse), at(out), out.length, gain, offset);
    },
    halve(luma, out, width, height) {
      wasm.halve(at(luma), at(out), width, height);
    },
    blur(src, between, out, width, height, taps) {
      tapsAt.set(taps);
      wasm.blurRows(at(src), at(between), width, height, tapsAt.byteOffset, taps.length - 1);
      wasm.blurColumns(at(between), at(out), width, height, tapsAt.byteOffset, taps.length - 1);
    },
    peaks(src, width, height, sign, threshold) {
      const n = wasm.peaks(at(src), width, height, sign, threshold, found.byteOffset, mostPeaks);
      return found.subarray(0, n);
    },
    sortStack(planes, ranks, middle, spread) {
      if (middle.length < 16) throw new Error("a stack needs planes of 16 pixels or more");
      planes.forEach((plane, k) => {
        pointers[k] = at(plane);
      });
      wasm.sortStack(
        pointers.byteOffset,
        networkAt.byteOffset,
        network.length / 2,
        scratch.byteOffset,
        middle.length,
        ranks.low,
        ranks.high,
        ranks.lower,
        ranks.upper,
        at(middle),
        at(spread),
      );
    },
    shifted(src, out, width, height, dx, dy) {
      wasm.shifted(at(src), at(out), width, height, dx, dy);
    },
  };
}

function decodeBase64(text: string): Uint8Array {
  const alphabet = "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/";
  const clean = text.replace(/=+$/, "");
  const out = new Uint8Array((clean.length * 3) >> 2);
  let bits = 0;
  let value = 0;
  let n = 0;
  for (const c of clean) {
    value = ((value << 6) | alphabet.indexOf(c)) & 0xffffff;
    bits += 6;
    if (bits >= 8) {
      bits -= 8;
      out[n++] = (value >> bits) & 255;
    }
  }
  return out;
}
