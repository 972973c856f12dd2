import { strToU8 } from "fflate";
import { finite, rounded } from "./numbers.ts";

/** A value as JSON holds it. */
export type Json = null | boolean | number | string | readonly Json[] | { readonly [name: string]: Json };

/** JSON for people and machines: two blanks a level, a line end at the end, UTF-8. */
export function jsonBytes(value: Json): Uint8Array {
  return strToU8(`${JSON.stringify(value, null, 2)}\n`);
}

/** The same value with every number rounded to eight significant digits. Throws on NaN and infinity. */
export function roundedJson(value: Json): Json {
  return mapNumbers(value, rounded, "");
}

/**
 * The same value if JSON can hold all of it; numbers as they are.
 * @throws Error naming the place of a NaN, an infinity, a typed array, a function or the like.
 */
export function asJson(value: unknown): Json {
  return mapNumbers(value, finite, "");
}

function mapNumbers(value: unknown, change: (value: number) => number, place: string): Json {
  if (value === null || typeof value === "boolean" || typeof value === "string") return value;
  if (typeof value === "number") {
    if (!Number.isFinite(value)) throw new Error(`${place || "the value"} is ${value}, which JSON can't hold`);
    return change(value);
  }
  if (Array.isArray(value)) return value.map((item, i) => mapNumbers(item, change, `${place}[${i}]`));
  if (typeof value === "object" && Object.getPrototypeOf(value) === Object.prototype) {
    const entries = Object.entries(value).filter(([, item]) => item !== undefined);
    return Object.fromEntries(entries.map(([name, item]) => [name, mapNumbers(item, change, `${place}.${name}`)]));
  }
  throw new Error(`${place || "the value"} is something JSON can't hold`);
}
