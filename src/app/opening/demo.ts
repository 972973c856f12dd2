import { InputError } from "../../quantities/index.ts";
import { readTrial } from "../../trial/index.ts";
import type { TrialSource } from "../state/workbench-state.ts";

/** Fetches the demo trial that lies beside the page. */
export async function demoTrial(): Promise<TrialSource> {
  const { trial, warnings } = readTrial(await (await fetched("trial.json")).text(), "trial.json");
  const recording = await (await fetched(trial.recording)).blob();
  return {
    name: "Demo",
    description: trial,
    recording: new File([recording], trial.recording.split("/").at(-1)!),
    warnings,
  };
}

async function fetched(name: string): Promise<Response> {
  const path = `demo/${name.split("/").map(encodeURIComponent).join("/")}`;
  const response = await fetch(new URL(path, document.baseURI)).catch(() => null);
  if (response?.ok) return response;
  throw new InputError(
    "demo-missing",
    "The demo trial could not be loaded.",
    path,
    "Check that the workbench's server is still running, then try again.",
  );
}
