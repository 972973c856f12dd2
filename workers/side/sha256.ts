import { sha256 } from "@noble/hashes/sha2";
import { bytesToHex } from "@noble/hashes/utils";

const pieceBytes = 4 << 20;

/** SHA-256 of a file as lower-case hex, read piece by piece: the browser's own digest wants the whole file in memory. */
export async function sha256Of(file: Blob): Promise<string> {
  const hash = sha256.create();
  for (let at = 0; at < file.size; at += pieceBytes) {
    hash.update(new Uint8Array(await file.slice(at, at + pieceBytes).arrayBuffer()));
  }
  return bytesToHex(hash.digest());
}
