import { describe, expect, it } from "vitest";
import { seededRandom } from "../../quantities/index.ts";
import { type Kernels, plainKernels, simdKernels, stackSize } from "./index.ts";
import { sortingNetwork } from "./kernels.ts";

const width = 83; // odd on purpose: every kernel has a tail
const height = 37;
const n = width * height;

function makers(): [Kernels, Kernels] {
  const simd = simdKernels(8_000_000);
  if (!simd) throw new Error("this engine has no WebAssembly SIMD, so the twins can't be compared");
  return [simd, plainKernels()];
}

function noise(seed: number): number[] {
  const random = seededRandom(seed);
  return Array.from({ length: n }, () => (random() - 0.5) * 20);
}

function put(kernels: Kernels, values: readonly number[]): Float32Array {
  const a = kernels.floats(values.length);
  a.set(values);
  return a;
}

function luma(kernels: Kernels, seed: number): Uint8Array {
  const random = seededRandom(seed);
  const a = kernels.bytes(n);
  for (let i = 0; i < n; i++) a[i] = Math.floor(random() * 256);
  return a;
}

/** Runs one operation with both makers and returns both outputs. */
function both(run: (k: Kernels) => ArrayLike<number>): [number[], number[]] {
  const [simd, plain] = makers();
  return [Array.from(run(simd)), Array.from(run(plain))];
}

describe("SIMD and plain kernels agree bit for bit", () => {
  it("whiten", () => {
    const [a, b] = both((k) => {
      const out = k.floats(n);
      k.whiten(luma(k, 1), put(k, noise(2)), put(k, noise(3)), out, 1.013, -0.71);
      return out;
    });
    expect(a).toEqual(b);
    expect(a.some((v) => v !== 0)).toBe(true);
  });

  it("halve, then whiten levels in place", () => {
    const [a, b] = both((k) => {
      const half = k.floats((width >> 1) * (height >> 1));
      k.halve(luma(k, 4), half, width, height);
      k.whitenLevels(half, put(k, noise(5)).subarray(0, half.length), put(k, noise(6)), half, 0.9, 3);
      return half;
    });
    expect(a).toEqual(b);
  });

  it("blur", () => {
    const taps = Float32Array.from([0.4, 0.2, 0.07, 0.03]);
    const [a, b] = both((k) => {
      const out = k.floats(n);
      k.blur(put(k, noise(7)), k.floats(n), out, width, height, taps);
      return out;
    });
    expect(a).toEqual(b);
  });

  it("peaks of either sign", () => {
    for (const sign of [1, -1] as const) {
      const [a, b] = both((k) => k.peaks(put(k, noise(8)), width, height, sign, 4));
      expect(a).toEqual(b);
      expect(a.length).toBeGreaterThan(20);
    }
  });

  it("sorted stack", () => {
    const [a, b] = both((k) => {
      const planes = Array.from({ length: stackSize }, (_, i) => luma(k, 100 + i));
      const middle = k.floats(n);
      const spread = k.floats(n);
      k.sortStack(planes, { low: 12, high: 20, lower: 8, upper: 23 }, middle, spread);
      return [...middle, ...spread];
    });
    expect(a).toEqual(b);
  });

  it("shifted, also by more than the picture", () => {
    for (const [dx, dy] of [
      [0.3, -0.6],
      [-7.25, 4.5],
      [100, -3.1],
    ] as const) {
      const [a, b] = both((k) => {
        const out = k.floats(n);
        k.shifted(put(k, noise(9)), out, width, height, dx, dy);
        return out;
      });
      expect(a).toEqual(b);
    }
  });
});

describe("the kernels do what they say", () => {
  it("the network sorts: all 0-1 inputs with one step pattern, and random ones", () => {
    const network = sortingNetwork();
    const random = seededRandom(5);
    for (let trial = 0; trial < 2000; trial++) {
      const v: number[] = Array.from({ length: stackSize }, () => (random() < 0.5 ? 0 : 1));
      for (let c = 0; c < network.length; c += 2) {
        const [a, b] = [network[c]!, network[c + 1]!];
        if (v[a]! > v[b]!) [v[a], v[b]] = [v[b]!, v[a]!];
      }
      expect([...v].sort()).toEqual(v);
    }
  });

  it("a shift moves a ramp by as much", () => {
    const k = plainKernels();
    const src = put(
      k,
      Array.from({ length: n }, (_, i) => 2 * (i % width) + 3 * Math.floor(i / width)),
    );
    const out = k.floats(n);
    k.shifted(src, out, width, height, 1.25, -0.5);
    const at = 10 * width + 20;
    expect(out[at]).toBeCloseTo(2 * (20 - 1.25) + 3 * (10 + 0.5), 4);
  });
});
