import { describe, expect, it } from "vitest";
import { InputError } from "../quantities/index.ts";
import { chooseRecording, isRecordingName } from "./index.ts";

function refusal(names: readonly string[], named: string | null): InputError {
  try {
    chooseRecording(names, named, "T07");
  } catch (error) {
    if (error instanceof InputError) return error;
    throw error;
  }
  throw new Error("nothing was refused");
}

describe("chooseRecording", () => {
  it("takes the one recording of a folder without a description", () => {
    expect(chooseRecording(["notes.txt", "IMG_0042.MOV", "._IMG_0042.MOV", ".a.mp4", "old/b.mp4"], null, "T07")).toBe(
      "IMG_0042.MOV",
    );
  });

  it("refuses a folder without a recording", () => {
    const error = refusal(["notes.txt", "._a.mp4"], null);
    expect(error.code).toBe("recording-missing");
    expect(error.message).toBe("The folder holds neither a trial.json nor a recording.");
  });

  it("refuses several recordings without a description, and lists them", () => {
    const error = refusal(["b.avi", "a.mp4", "c.webm"], null);
    expect(error.code).toBe("recording-ambiguous");
    expect(error.message).toContain("holds 3 recordings");
    expect(error.message).toContain("a.mp4, b.avi, c.webm");
  });

  it("takes the recording that the description names, whatever its ending", () => {
    expect(chooseRecording(["a.mp4", "day/b.dat"], "day/b.dat", "T07")).toBe("day/b.dat");
  });

  it("finds a name whose accents are stored apart", () => {
    const apart = "Lo\u0308we.mp4";
    expect(chooseRecording([apart], "L\u00f6we.mp4", "T07")).toBe(apart);
  });

  it("names a missing recording and those like it", () => {
    expect(refusal(["Swim.MP4", "scale.png"], "swim.mp4").message).toBe(
      'trial.json names the recording "swim.mp4", which is not in the folder. Similar there: Swim.MP4.',
    );
    expect(refusal(["trial.json", "beads.webm"], "swim.mp4").message).toContain("Recordings there: beads.webm.");
    expect(refusal(["trial.json"], "swim.mp4").message).toContain("There is no recording in it.");
  });
});

describe("isRecordingName", () => {
  it.each(["a.mp4", "a.m4v", "a.MOV", "x/a.webm", "a.mkv", "a b.avi"])("takes %s", (name) => {
    expect(isRecordingName(name)).toBe(true);
  });
  it.each(["mp4", ".mp4", "a.mp4.txt", "._a.mp4", "x/.a.mov", "a.png", "a.csv"])("leaves %s", (name) => {
    expect(isRecordingName(name)).toBe(false);
  });
});
