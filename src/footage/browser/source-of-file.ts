import { BlobSource } from "mediabunny";
import { bytesOfBlob } from "../bytes.ts";
import type { OpenableSource } from "../open-source.ts";
import { loadCoreInBrowser } from "./core-in-browser.ts";
import { webCodecsDecoder } from "./webcodecs.ts";

/** A picked file and the ways of decoding it in a browser. */
export const sourceOfFile = (file: File): OpenableSource => ({
  name: file.name,
  bytes: bytesOfBlob(file),
  source: new BlobSource(file),
  fast: webCodecsDecoder,
  mountable: file,
  loadCore: loadCoreInBrowser,
});
