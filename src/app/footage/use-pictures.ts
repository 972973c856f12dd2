import { useCallback, useEffect, useMemo, useRef, useState } from "react";
import { type OpenedPictures, openPictures, type PicturesWorker } from "../../../workers/index.ts";
import { type Problem, problemOf } from "../state/problem.ts";
import { nearestFrame } from "./frame-at.ts";

/** A decoded frame on show. */
export interface Picture {
  readonly frame: number;
  /** Null when the frame can't be decoded. */
  readonly bitmap: ImageBitmap | null;
}

/** A recording being looked at. */
export interface Pictures {
  /** Null until the recording is open. */
  readonly opened: OpenedPictures | null;
  /** The latest picture that came; null before the first. */
  readonly picture: Picture | null;
  /** Why there are no pictures; null while there is nothing wrong. */
  readonly problem: Problem | null;
}

/**
 * Opens a recording for looking at and keeps asking for the frame that is wanted.
 *
 * @param measured_s times of the frames that were measured, which `frame` counts; null before measuring
 */
export function usePictures(
  recording: File,
  captureFps: number | null,
  frame: number,
  measured_s: Float64Array | null,
): Pictures {
  const worker = useRef<PicturesWorker | null>(null);
  const [opened, setOpened] = useState<OpenedPictures | null>(null);
  const [picture, setPicture] = useState<Picture | null>(null);
  const [problem, setProblem] = useState<Problem | null>(null);

  const show = useCallback((next: Picture | null) => {
    setPicture((last) => {
      if (last !== next) last?.bitmap?.close();
      return next;
    });
  }, []);

  useEffect(() => {
    const open = openPictures(recording, captureFps, {
      opened: setOpened,
      shown: (frame, bitmap) => show({ frame, bitmap }),
      failed: (error) => setProblem(problemOf("The pictures can’t be shown", error)),
    });
    worker.current = open;
    return () => {
      open.close();
      worker.current = null;
      show(null);
      setOpened(null);
      setProblem(null);
    };
  }, [recording, captureFps, show]);

  // Where a frame can't be decoded, measuring has one less than the container lists: times tell which is which.
  const listed_s = opened?.times_s ?? null;
  const differ = listed_s !== null && measured_s !== null && listed_s.length !== measured_s.length;
  const wanted = differ ? nearestFrame(listed_s, measured_s[frame] ?? 0) : frame;

  // Asked again when the recording is another one: `opened` is a new object then.
  // biome-ignore lint/correctness/useExhaustiveDependencies: see above
  useEffect(() => {
    worker.current?.show(wanted);
  }, [wanted, opened]);

  const shown = useMemo(
    () => (picture && differ ? { ...picture, frame: nearestFrame(measured_s, listed_s[picture.frame] ?? 0) } : picture),
    [picture, differ, measured_s, listed_s],
  );
  return { opened, picture: shown, problem };
}
