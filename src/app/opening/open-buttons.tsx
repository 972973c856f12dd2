import { useRef } from "react";
import { Icon } from "../chrome/icon.tsx";
import { type FolderFile, pickedFiles } from "./folder-file.ts";

export interface OpenButtonsProps {
  readonly open: (files: readonly FolderFile[]) => void;
  readonly openDemo: () => void;
  /** The first of them is what to do next. */
  readonly prominent?: boolean;
}

/** Opens a trial folder, recordings, or the demo. */
export function OpenButtons({ open, openDemo, prominent = false }: OpenButtonsProps) {
  const folder = useRef<HTMLInputElement>(null);
  const files = useRef<HTMLInputElement>(null);
  const take = (input: HTMLInputElement) => {
    const picked = pickedFiles(input.files ?? []);
    // The same folder can then be picked again.
    input.value = "";
    if (picked.length > 0) open(picked);
  };
  return (
    <div className="open-buttons">
      <button type="button" className={prominent ? "first" : "quiet"} onClick={() => folder.current?.click()}>
        <Icon name="folder" /> Open a trial folder
      </button>
      <button type="button" className={prominent ? "" : "quiet"} onClick={() => files.current?.click()}>
        <Icon name="film" /> Open a recording
      </button>
      <button type="button" className={prominent ? "" : "quiet"} onClick={openDemo}>
        Open the demo
      </button>
      <input
        ref={folder}
        type="file"
        hidden
        aria-label="Trial folder"
        data-opens="folder"
        {...{ webkitdirectory: "" }}
        onChange={(event) => take(event.target)}
      />
      <input
        ref={files}
        type="file"
        hidden
        multiple
        aria-label="Recording"
        data-opens="files"
        accept="video/*,.mp4,.m4v,.mov,.webm,.mkv,.avi,.json"
        onChange={(event) => take(event.target)}
      />
    </div>
  );
}
