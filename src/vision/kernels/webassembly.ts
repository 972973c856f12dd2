/**
 * The part of the WebAssembly interface that the kernels use. It is the same in browsers and Node, but TypeScript
 * declares it only with the DOM, which pure code must not see.
 */
interface WebAssemblyInterface {
  readonly Memory: new (size: { initial: number; maximum: number }) => { readonly buffer: ArrayBuffer };
  readonly Module: new (bytes: Uint8Array) => object;
  readonly Instance: new (module: object, imports: object) => { readonly exports: object };
}

export const WebAssembly = (globalThis as unknown as { WebAssembly: WebAssemblyInterface }).WebAssembly;
