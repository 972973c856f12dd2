/** A file that the core can read piece by piece: a browser's File, or what looks like one. */
export interface MountableFile {
  readonly size: number;
  slice(from: number, to: number): unknown;
}

/** What a device of the core's file system answers to. `buffer` is the core's memory. */
export interface CoreDevice {
  open(): void;
  close(): void;
  read(): number;
  write(stream: unknown, buffer: Uint8Array, offset: number, length: number): number;
  llseek(): number;
}

/** The part of the ffmpeg core (ffmpeg 5.1 compiled to WebAssembly) that reading uses. */
export interface FfmpegCore {
  /** Run to their end without letting go of the thread; return the exit code. */
  exec(...args: string[]): number;
  ffprobe(...args: string[]): number;
  setLogger(logger: (line: { readonly type: string; readonly message: string }) => void): void;
  readonly FS: {
    readonly filesystems: { readonly WORKERFS: unknown };
    readonly ErrnoError: new (code: number) => Error;
    mkdir(path: string): void;
    mount(type: unknown, options: { blobs: readonly { name: string; data: MountableFile }[] }, path: string): void;
    unmount(path: string): void;
    makedev(major: number, minor: number): number;
    registerDevice(device: number, operations: CoreDevice): void;
    mkdev(path: string, device: number): void;
    readFile(path: string, options: { encoding: "utf8" }): string;
    unlink(path: string): void;
    analyzePath(path: string): { exists: boolean };
  };
}

/** How the core is made by its package. */
export type CoreFactory = (module: { wasmBinary?: Uint8Array; mainScriptUrlOrBlob?: string }) => Promise<FfmpegCore>;

/** Gives this thread's core, loading it when first asked for; `anew` gives up the old one after a crash. */
export type CoreLoader = (anew?: boolean) => Promise<FfmpegCore>;

/** Name of the core with its version, as results record it. */
export const coreName = "ffmpeg core 0.12.10 (wasm)";
