import type { Progress } from "../../quantities/index.ts";

/** `Finding cells: 220 of 600`. */
export function progressWords({ stage, done, total }: Progress): string {
  const name = stage.charAt(0).toUpperCase() + stage.slice(1);
  if (total === null) return done > 0 ? `${name}: ${Math.round(done)}` : `${name} …`;
  return `${name}: ${Math.round(done)} of ${Math.round(total)}`;
}

/** `about 12 s left in this stage`, in steps that don't flicker; empty when nothing can be said. */
export function leftWords(left_s: number | null): string {
  if (left_s === null) return "";
  if (left_s < 2) return "almost done with this stage";
  if (left_s < 20) return `about ${Math.round(left_s)} s left in this stage`;
  if (left_s < 90) return `about ${Math.round(left_s / 5) * 5} s left in this stage`;
  return `about ${Math.round(left_s / 60)} min left in this stage`;
}
