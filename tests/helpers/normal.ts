import type { Random } from "../../src/quantities/index.ts";

/** Standard normal numbers from uniform ones (Box and Muller 1958, Ann. Math. Stat. 29, 610). */
export function normalFrom(random: Random): () => number {
  return () => Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random());
}
