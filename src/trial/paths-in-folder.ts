/**
 * A path inside the trial folder in one spelling: `/` between folders, no `.` steps. Null when the path is absolute,
 * is an address, or leads out of the folder.
 */
export function insideFolder(path: string): string | null {
  const slashed = path.replaceAll("\\", "/");
  if (slashed.startsWith("/") || /^[A-Za-z][A-Za-z0-9+.-]*:/.test(slashed) || slashed.includes("\0")) return null;
  const steps = slashed.split("/").filter((step) => step !== "" && step !== ".");
  if (steps.length === 0 || steps.includes("..") || slashed.endsWith("/")) return null;
  return steps.join("/");
}
