import type { Interval } from "../../quantities/index.ts";
import { readable } from "../numbers.ts";

/** `1 cell`, `12 cells`. */
export function many(count: number, one: string, more: string): string {
  return `${count} ${count === 1 ? one : more}`;
}

/** An interval in words, rounded to its own width: `31.6 to 34.5`. */
export function range([low, high]: Interval): string {
  const half = (high - low) / 2;
  return `${readable(low, half)} to ${readable(high, half)}`;
}

/** A fraction as a percentage: whole, or with one decimal below 10 %. */
export function share(fraction: number): string {
  const percent = fraction * 100;
  return `${percent.toFixed(percent < 9.95 && percent > 0 ? 1 : 0)}\u00a0%`;
}

/** An interval of fractions as percentages: `61 to 78 %`. */
export function shareRange([low, high]: Interval): string {
  return `${share(low).replace("\u00a0%", "")} to ${share(high)}`;
}

/** A short stable name as words: `frame_rate` becomes `Frame rate`. */
export function asWords(name: string): string {
  const words = name.replaceAll("_", " ").trim();
  return words.charAt(0).toUpperCase() + words.slice(1);
}
