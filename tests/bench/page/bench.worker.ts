import { openInBrowser } from "../../../src/footage/browser/index.ts";
import { decodeOnly, measureAll } from "../both-ways.ts";

self.onmessage = async ({ data }: MessageEvent<{ what: "decode" | "measure"; file: File }>) => {
  const open = () => openInBrowser(data.file, {});
  self.postMessage(data.what === "decode" ? await decodeOnly(open) : await measureAll(open, data.file.name));
};
