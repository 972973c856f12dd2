import { existsSync, mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterEach, beforeEach, describe, expect, it, vi } from "vitest";
import { type FolderKind, removedWhenStopped, writeFolder } from "./whole-folder.ts";

const kind: FolderKind = { name: "result", mark: "mark.json", schema: "test/thing@" };
const mark = '{ "schema": "test/thing@1" }';

let parent = "";
beforeEach(() => {
  parent = mkdtempSync(join(tmpdir(), "whole-"));
});
afterEach(() => {
  vi.restoreAllMocks();
  rmSync(parent, { recursive: true, force: true });
});

describe("a folder written all at once", () => {
  it("isn't there when its writing fails, nor is what was made above it", async () => {
    const failing = async (folder: string) => {
      writeFileSync(join(folder, "half"), "");
      throw new Error("no more");
    };
    await expect(writeFolder(join(parent, "a", "b", "c"), kind, false, failing)).rejects.toThrow("no more");
    expect(readdirSync(parent)).toEqual([]);
  });

  it("leaves the older one when its writing fails, and replaces it whole when not", async () => {
    const target = join(parent, "r");
    mkdirSync(target);
    writeFileSync(join(target, "mark.json"), mark);
    const failing = () => Promise.reject(new Error("no more"));
    await expect(writeFolder(target, kind, true, failing)).rejects.toThrow("no more");
    expect(readFileSync(join(target, "mark.json"), "utf8")).toBe(mark);
    await writeFolder(target, kind, true, async (folder) => writeFileSync(join(folder, "new"), ""));
    expect(readdirSync(target)).toEqual(["new"]);
    expect(readdirSync(parent)).toEqual(["r"]);
  });

  it.each(["{}", '{ "schema": 3 }', '{ "schema": "other@1" }', "null", "no JSON"])(
    "is not replaced when its mark holds %s",
    async (content) => {
      const target = join(parent, "r");
      mkdirSync(target);
      writeFileSync(join(target, "mark.json"), content);
      await expect(writeFolder(target, kind, true, async () => {})).rejects.toThrow("will not be touched");
      expect(readFileSync(join(target, "mark.json"), "utf8")).toBe(content);
    },
  );

  it("goes when the program is told to stop, which then stops; a later signal finds nothing waiting", async () => {
    const kill = vi.spyOn(process, "kill").mockReturnValue(true);
    const waiting = process.listenerCount("SIGHUP");
    const folder = join(parent, "unfinished");
    mkdirSync(folder);
    await removedWhenStopped(folder, async () => {
      writeFileSync(join(folder, "half"), "");
      process.emit("SIGHUP", "SIGHUP");
    });
    expect(existsSync(folder)).toBe(false);
    expect(kill.mock.calls).toEqual([[process.pid, "SIGHUP"]]);
    expect(process.listenerCount("SIGHUP")).toBe(waiting);
  });
});
