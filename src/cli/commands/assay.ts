import { writeFile } from "node:fs/promises";
import { join } from "node:path";
import { type Assay, assayPresets, planAssay, trialJson, truthCsv, truthJson } from "../../assay/index.ts";
import { usageError } from "../arguments.ts";
import { type AssayRequest, readAssayRequest } from "../assay-request.ts";
import { encodeRecording } from "../encode/index.ts";
import type { Io } from "../io.ts";
import { checkFolder, type FolderKind, writeFolder } from "../whole-folder.ts";

export const help = `lodewake assay --out FOLDER [--preset NAME] [--seed N] [--seconds S] [--set SECTION.NAME=VALUE]... [options]

Makes a synthetic trial whose truth is known: the recording and trial.json in the folder FOLDER, and beside them
truth.csv (every cell in every frame) and truth.json (each cell's speed and moment, the trial's own figures, all
settings). The same request makes the same bytes.

  --out FOLDER        the folder to write
  --preset NAME       what to film (plain when left out); --list shows all
  --seed N            another sample of the same kind: 0 to 4294967295
  --seconds S         how long to film
  --set S.N=VALUE     any one setting over the preset's, as often as wanted; truth.json shows them all:
                      --set swimmers.speed_um_s=60 --set time.fps=60 --set "sample.flow_um_s=[4,0]"
  --codec NAME        h264 (when left out), mjpeg, or with the optional codec library hevc, vp9 or av1
  --container NAME    mp4 or mov for h264 and hevc, webm or mp4 for vp9 and av1, avi for mjpeg
  --quality N         constant rate factor, Motion JPEG: quantiser; smaller is better
  --rotate DEGREES    0, 90, 180 or 270: code the picture lying, with a tag that says how to turn it upright
                      (clockwise), as phones do
  --trial, --strain, --culture, --condition NAME
                      names for trial.json
  --replace           replace an older synthetic trial in FOLDER
  --list              print the presets

Exit codes: 0 made, 2 the request is wrong, 1 Lodewake failed.`;

const kind: FolderKind = { name: "synthetic trial", mark: "truth.json", schema: "lodewake/assay-truth@" };

/** Runs `lodewake assay`. @throws InputError when the request is wrong */
export async function assay(args: readonly string[], io: Pick<Io, "out" | "progress">): Promise<void> {
  const request = readAssayRequest(args);
  if (request.list) {
    for (const [name, { about }] of Object.entries(assayPresets)) io.out(`${name.padEnd(18)}${about}`);
    return;
  }
  await checkFolder(request.out, kind, request.replace);
  const planned = planAssay(request.options);
  if (request.encoding.container === "avi" && !planned.constantRate) {
    throw usageError("assay", "AVI keeps no times, so the frame rate must be even: choose another --codec or preset.");
  }
  await writeFolder(request.out, kind, request.replace, (folder) => fill(folder, planned, request, io));
  const { frames, width, height, settings } = planned;
  io.out(`Synthetic trial: ${request.out}`);
  io.out(`${frames} frames of ${width} x ${height}, ${settings.time.seconds} s, seed ${settings.seed}`);
}

async function fill(folder: string, planned: Assay, request: AssayRequest, io: Pick<Io, "progress">): Promise<void> {
  const { container } = request.encoding;
  const { time } = planned.settings;
  const recording = `swim.${container}`;
  const tagged = container === "mp4" || container === "mov";
  const slow = time.container_fps !== null && time.container_fps !== time.fps;
  const options = {
    ...request.encoding,
    keyframeEvery: 30,
    captureRateTag_hz: slow && tagged ? time.fps : null,
  };
  await encodeRecording(planned, join(folder, recording), options, (done) =>
    io.progress({ stage: "filming", done, total: planned.frames }),
  );
  const trial = trialJson(planned.settings, recording, request.labels);
  await writeFile(join(folder, "trial.json"), `${JSON.stringify(trial, null, 2)}\n`);
  await writeFile(join(folder, "truth.json"), `${JSON.stringify(truthJson(planned), null, 2)}\n`);
  await writeFile(join(folder, "truth.csv"), truthCsv(planned));
}
