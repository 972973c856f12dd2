/**
 * The bytes that a `Range` header asks for, as [first, last]; null for the whole file (no header, several ranges, or
 * one that can't be read, which a server may ignore: RFC 9110, section 14.2).
 */
export function byteRange(
  header: string | undefined,
  size: number,
): readonly [first: number, last: number] | "unsatisfiable" | null {
  const asked = /^bytes=(\d*)-(\d*)$/.exec(header ?? "");
  if (!asked || (asked[1] === "" && asked[2] === "")) return null;
  if (asked[1] === "") {
    const count = Math.min(size, Number(asked[2]));
    return count === 0 ? "unsatisfiable" : [size - count, size - 1];
  }
  const first = Number(asked[1]);
  const last = asked[2] === "" ? size - 1 : Math.min(size - 1, Number(asked[2]));
  if (asked[2] !== "" && Number(asked[2]) < first) return null;
  return first >= size ? "unsatisfiable" : [first, last];
}
