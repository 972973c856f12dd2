import { type Kernels, mostPeaks, stackSize } from "./kernels.ts";
import { plainKernels } from "./plain.ts";
import { simdKernels } from "./simd.ts";

export { type Kernels, mostPeaks, plainKernels, simdKernels, stackSize };

/** The fastest kernels this engine has, with memory for `capacity` bytes of planes. The numbers are the same either way. */
export function bestKernels(capacity: number): Kernels {
  return simdKernels(capacity) ?? plainKernels();
}
