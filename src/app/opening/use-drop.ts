import { useEffect, useState } from "react";
import { droppedFiles, type FolderFile } from "./folder-file.ts";

/**
 * Takes files and folders dropped anywhere on the page.
 * @returns true while something that could be dropped is held over the page
 */
export function useDrop(open: (files: Promise<readonly FolderFile[]>) => void): boolean {
  const [over, setOver] = useState(false);
  useEffect(() => {
    const hasFiles = (event: DragEvent) => event.dataTransfer?.types.includes("Files") ?? false;
    const hold = (event: DragEvent) => {
      if (!hasFiles(event)) return;
      event.preventDefault();
      event.dataTransfer!.dropEffect = "copy";
      setOver(true);
    };
    const leave = (event: DragEvent) => {
      if (event.relatedTarget === null) setOver(false);
    };
    const drop = (event: DragEvent) => {
      setOver(false);
      if (!hasFiles(event)) return;
      event.preventDefault();
      open(droppedFiles(event.dataTransfer!));
    };
    window.addEventListener("dragenter", hold);
    window.addEventListener("dragover", hold);
    window.addEventListener("dragleave", leave);
    window.addEventListener("drop", drop);
    return () => {
      window.removeEventListener("dragenter", hold);
      window.removeEventListener("dragover", hold);
      window.removeEventListener("dragleave", leave);
      window.removeEventListener("drop", drop);
    };
  }, [open]);
  return over;
}
