import { useState } from "react";
import type { MeasuredTrial } from "../../quantities/index.ts";
import { Icon } from "../chrome/icon.tsx";
import { type Problem, problemOf } from "../state/problem.ts";
import { resultName, saveInto, saveZip } from "./save.ts";

interface SaveButtonsProps {
  readonly measured: MeasuredTrial;
  /** How the trial is called. */
  readonly name: string;
  readonly saved: () => void;
  readonly failed: (problem: Problem) => void;
}

declare global {
  interface Window {
    /** Only some browsers have it. */
    showDirectoryPicker?: (options: { mode: "readwrite"; id: string }) => Promise<FileSystemDirectoryHandle>;
  }
}

/** Saves the result files: as one zip, or into a folder where the browser can write to one. */
export function SaveButtons({ measured, name, saved, failed }: SaveButtonsProps) {
  const [said, setSaid] = useState("");
  const attempt = async (save: () => Promise<string>) => {
    setSaid("Making the files …");
    try {
      setSaid(await save());
      saved();
    } catch (error) {
      setSaid("");
      if (!isTakenBack(error)) failed(problemOf("The results could not be saved", error));
    }
  };
  const zip = async () => {
    await saveZip(measured, resultName(name));
    return "Saved as zip.";
  };
  const folder = async () => {
    const parent = await window.showDirectoryPicker!({ mode: "readwrite", id: "results" });
    return `Saved in the folder ${await saveInto(parent, measured, resultName(name))}.`;
  };
  return (
    <>
      <button type="button" className={said ? "" : "first"} onClick={() => attempt(zip)}>
        <Icon name="save" /> Save results
      </button>
      {window.showDirectoryPicker && (
        <button type="button" aria-label="Save into a folder" onClick={() => attempt(folder)}>
          Into a folder …
        </button>
      )}
      <output className="said">{said}</output>
    </>
  );
}

/** The person closed the browser's own dialog: nothing went wrong. */
function isTakenBack(error: unknown): boolean {
  return error instanceof DOMException && error.name === "AbortError";
}
