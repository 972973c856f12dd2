import { createHash } from "node:crypto";
import { createReadStream } from "node:fs";

/** SHA-256 of a file's bytes, lower-case hexadecimal. Memory doesn't grow with its length. */
export async function sha256OfFile(path: string): Promise<string> {
  const hash = createHash("sha256");
  for await (const chunk of createReadStream(path, { highWaterMark: 1 << 20 })) hash.update(chunk as Uint8Array);
  return hash.digest("hex");
}
