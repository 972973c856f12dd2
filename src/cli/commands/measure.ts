import { basename, join } from "node:path";
import type { FootageSettings } from "../../footage/index.ts";
import { openInNode } from "../../footage/node/index.ts";
import { defaultMeasureSettings, measureTrial } from "../../pipeline/index.ts";
import { InputError, type MeasuredTrial } from "../../quantities/index.ts";
import { resultFiles } from "../../report/index.ts";
import type { TrialDescription } from "../../trial/index.ts";
import { readArguments, usageError } from "../arguments.ts";
import { findingLines } from "../finding-lines.ts";
import type { Io } from "../io.ts";
import { checkResultFolder, writeResultFolder } from "../result-folder.ts";
import { sha256OfFile } from "../sha256.ts";
import { tool } from "../tool.ts";
import { readTrialFolder } from "../trial-folder.ts";

export const help = `lodewake measure TRIAL --out RESULT [--replace] [--decoder auto|native|wasm] [--json]

Measures the trial in the folder TRIAL and writes the result into the folder RESULT, all at once.

  TRIAL             a folder with trial.json and the recording, or with one recording alone
  --out RESULT      the folder to write: paths.csv, cells.csv, turns.csv, front.csv, summary.json,
                    report.html, datapackage.json
  --replace         replace an older result in RESULT
  --decoder NAME    auto (the default): the fastest that reads the recording; native: the codec library
                    installed beside Lodewake; wasm: the one that always comes with it
  --json            progress, notes and errors as JSON, a line each, on standard error; the summary on
                    standard output

Exit codes: 0 measured (also when nothing moved), 2 the request or an input is wrong, 1 Lodewake failed.`;

/** Runs `lodewake measure`. @throws InputError when the request or an input is wrong */
export async function measure(args: readonly string[], json: boolean, io: Io): Promise<void> {
  const { values, positionals } = readArguments("measure", args, {
    out: { type: "string" },
    replace: { type: "boolean", default: false },
    decoder: { type: "string", default: "auto" },
    json: { type: "boolean" },
  });
  const [folder, ...more] = positionals;
  if (folder === undefined || folder === "") throw usageError("measure", "No trial folder was given.");
  if (more.length > 0) throw usageError("measure", `More than one trial folder was given: ${positionals.join(", ")}.`);
  if (values.out === undefined || values.out === "")
    throw usageError("measure", "No folder to write to was given (--out RESULT).");
  const { decoder } = values;
  if (!isDecoder(decoder)) throw usageError("measure", `--decoder is "${decoder}", but must be auto, native or wasm.`);

  const { trial, recording, warnings } = await readTrialFolder(folder);
  await checkResultFolder(values.out, values.replace);
  const measured = await measureRecording(trial, recording, decoder, io).catch((error) => {
    throw withPath(error, trial.recording, recording);
  });
  const complete = { ...measured, warnings: [...warnings, ...measured.warnings] };
  const files = resultFiles(complete);
  await writeResultFolder(values.out, files, values.replace);
  for (const { message } of complete.warnings) io.note(`Note: ${message}`);
  if (json) {
    const summary = files.find((f) => f.name === "summary.json");
    io.out(JSON.stringify(JSON.parse(new TextDecoder().decode(summary?.bytes))));
    return;
  }
  for (const line of findingLines(complete)) io.out(line);
  io.out(`Result: ${values.out} (open ${join(values.out, "report.html")})`);
}

/** @param recording path of the recording */
async function measureRecording(
  trial: TrialDescription,
  recording: string,
  decoder: DecoderName,
  io: Io,
): Promise<MeasuredTrial> {
  const captureFps = trial.captureFps === null ? {} : { captureFps: trial.captureFps };
  const footage = await openInNode(recording, { ...captureFps, decoder });
  try {
    const sha256 = await sha256OfFile(recording);
    const ports = { footage, recording: { name: trial.recording, sha256 }, tool };
    return await measureTrial(trial, ports, defaultMeasureSettings, { progress: (p) => io.progress(p) });
  } finally {
    footage.close();
  }
}

/** An error that names the recording as the trial does, with the recording's path instead: it has to be found. */
function withPath(error: unknown, name: string, path: string): unknown {
  if (!(error instanceof InputError) || (error.where !== name && error.where !== basename(name))) return error;
  return new InputError(error.code, error.message, path, error.remedy);
}

type DecoderName = NonNullable<FootageSettings["decoder"]>;

function isDecoder(name: string): name is DecoderName {
  return ["auto", "native", "wasm"].includes(name);
}
