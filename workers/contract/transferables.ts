/**
 * Every buffer inside `value` that can change threads without being copied: those that one typed array owns whole.
 * Views of part of a buffer (of WebAssembly memory, say) are left to be copied. Plain objects and arrays are searched.
 */
export function transferablesOf(value: unknown): Transferable[] {
  const found = new Set<ArrayBuffer>();
  search(value, found);
  return [...found];
}

function search(value: unknown, found: Set<ArrayBuffer>): void {
  if (typeof value !== "object" || value === null) return;
  if (ArrayBuffer.isView(value)) {
    const { buffer } = value;
    if (buffer instanceof ArrayBuffer && buffer.byteLength > 0 && buffer.byteLength === value.byteLength)
      found.add(buffer);
    return;
  }
  for (const inner of Object.values(value)) search(inner, found);
}
