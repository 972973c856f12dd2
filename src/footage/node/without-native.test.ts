import { fileURLToPath } from "node:url";
import { expect, it, vi } from "vitest";
import { openInNode } from "./index.ts";

vi.mock("node-av", () => {
  throw new Error("not installed");
});

const clip = fileURLToPath(new URL("../../../tests/fixtures/recordings/h264-10bit.mp4", import.meta.url));

it("reads with ffmpeg in WebAssembly when the native codec library is not installed", async () => {
  const footage = await openInNode(clip, {});
  expect(footage.facts.decoder).toBe("ffmpeg core 0.12.10 (wasm)");
  expect((await footage.read(() => "more")).framesRead).toBe(20);
  footage.close();
  await expect(openInNode(clip, { decoder: "native" })).rejects.toMatchObject({ code: "decoder-not-available" });
});
