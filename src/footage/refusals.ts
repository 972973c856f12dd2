import { InputError } from "../quantities/index.ts";

const originals = "Copy the untouched original from the phone or camera again";

export const noSuchFile = (name: string): InputError =>
  new InputError("recording-missing", "There is no such recording.", name, "Check the name and the folder.");

export const unreadableFile = (name: string, reason: string): InputError =>
  new InputError(
    "recording-unreadable",
    `The recording can't be opened: ${reason}.`,
    name,
    "Check that it is a file that you may read.",
  );

export const emptyFile = (name: string): InputError =>
  new InputError("recording-empty", "The recording is empty (0 bytes).", name, `${originals}.`);

export const notAVideo = (name: string): InputError =>
  new InputError(
    "not-a-video",
    "This is no video that can be recognised by its content.",
    name,
    "Give a recording in mp4, mov, webm, mkv or avi.",
  );

export const noVideoTrack = (name: string): InputError =>
  new InputError("no-video-track", "The file has no video track.", name, "Give the recording itself, not its sound.");

export const nothingToRead = (name: string, cutShort: boolean): InputError =>
  cutShort
    ? new InputError(
        "recording-cut-off",
        "The recording was cut off before anything in it could be decoded; its index or its first picture is missing.",
        name,
        `${originals}; let the copy finish.`,
      )
    : new InputError("recording-damaged", "No picture of the recording can be decoded.", name, `${originals}.`);

export const codecUnknown = (name: string, codec: string): InputError =>
  new InputError(
    "codec-not-supported",
    `No decoder here can read its codec (${codec}).`,
    name,
    "Export the recording as H.264 without changing its frame rate or size.",
  );

export const decoderAbsent = (name: string, wanted: string, codec: string): InputError =>
  new InputError(
    "decoder-not-available",
    `The decoder asked for (${wanted}) is not available for this recording (${codec}).`,
    name,
    "Leave the choice of decoder to the tool.",
  );

export const sizeChanges = (name: string, from: string, to: string): InputError =>
  new InputError(
    "picture-size-changes",
    `The picture changes its size along the recording, from ${from} to ${to} pixels.`,
    name,
    "Give a recording of one size, or cut it where the size changes.",
  );
