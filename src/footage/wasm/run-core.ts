import { DecoderFailure } from "../decoder.ts";
import type { CoreDevice, CoreLoader, FfmpegCore, MountableFile } from "./core.ts";

const folder = "/input";
const inputName = "recording";

/** Where the core finds the recording while it runs. */
export const inputPath = `${folder}/${inputName}`;

/** Where the core writes decoded pictures. */
export const picturesPath = "/pictures";

const answerPath = "/answer";

/** Error numbers of the core's C library (WASI). */
const interrupted = 29;
const notSeekable = 70;

/** Takes bytes the core has written; false stops the core. The bytes are the core's own memory. */
type ByteTaker = (bytes: Uint8Array) => boolean;

/** What is set up once in each core: the mount point and the device that pictures are written to. */
interface Rig {
  take: ByteTaker;
}

const rigs = new WeakMap<FfmpegCore, Rig>();

function rigOf(core: FfmpegCore): Rig {
  const known = rigs.get(core);
  if (known) return known;
  const rig: Rig = { take: () => false };
  const device: CoreDevice = {
    open() {},
    close() {},
    read: () => 0,
    write(_stream, buffer, offset, length) {
      if (!rig.take(buffer.subarray(offset, offset + length))) throw new core.FS.ErrnoError(interrupted);
      return length;
    },
    llseek() {
      throw new core.FS.ErrnoError(notSeekable);
    },
  };
  core.FS.mkdir(folder);
  const number = core.FS.makedev(64, 0);
  core.FS.registerDevice(number, device);
  core.FS.mkdev(picturesPath, number);
  rigs.set(core, rig);
  return rig;
}

/** One program of the core, run to its end on one mounted file. The core holds no more than a few pieces of it. */
async function run(load: CoreLoader, file: MountableFile, program: (core: FfmpegCore, rig: Rig) => number) {
  const core = await load();
  const rig = rigOf(core);
  core.FS.mount(core.FS.filesystems.WORKERFS, { blobs: [{ name: inputName, data: file }] }, folder);
  try {
    return { core, code: program(core, rig) };
  } catch (error) {
    // A crashed core is no good any more: the next one to ask gets a fresh one.
    await load(true);
    throw new DecoderFailure(`the core crashed: ${String(error)}`, { cause: error });
  } finally {
    core.FS.unmount(folder);
  }
}

/**
 * Runs the core's ffmpeg with the recording at {@link inputPath}. What the program writes to {@link picturesPath} goes
 * to `take`, what it logs to `log`, line by line, while it runs.
 * @returns its exit code; not 0 as well when `take` stopped it
 * @throws DecoderFailure when the core crashes
 */
export async function runFfmpeg(
  load: CoreLoader,
  file: MountableFile,
  args: readonly string[],
  take: ByteTaker,
  log: (line: string) => void,
): Promise<number> {
  const { code } = await run(load, file, (core, rig) => {
    core.setLogger(({ message }) => log(message));
    rig.take = take;
    return core.exec(...args);
  });
  return code;
}

/**
 * Asks the core's ffprobe about the recording.
 * @returns what it wrote, or null when it wrote nothing
 * @throws DecoderFailure when the core crashes
 */
export async function askFfprobe(
  load: CoreLoader,
  file: MountableFile,
  args: readonly string[],
): Promise<string | null> {
  // The exit code tells nothing: it is −1 although all went well.
  const { core } = await run(load, file, (core) => {
    core.setLogger(() => {});
    return core.ffprobe("-v", "error", ...args, "-i", inputPath, "-o", answerPath);
  });
  if (!core.FS.analyzePath(answerPath).exists) return null;
  const answer = core.FS.readFile(answerPath, { encoding: "utf8" });
  core.FS.unlink(answerPath);
  return answer;
}
