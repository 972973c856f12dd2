/** A 95 % interval, [low, high], in the unit of the figure it belongs to. */
export type Interval = readonly [low: number, high: number];

/** An estimate with its uncertainty. `n` counts the independent units behind it (cells, not frames). */
export interface Figure {
  readonly value: number;
  readonly standardError: number;
  readonly ci95: Interval;
  readonly n: number;
}

/** A figure that can't be had: what was needed, what was there. Written as null with a warning, never as NaN. */
export interface Refusal {
  readonly refused: true;
  readonly needed: string;
  readonly had: string;
}

/** Builds a {@link Refusal}. */
export function refuse(needed: string, had: string): Refusal {
  return { refused: true, needed, had };
}

/** Tells a refusal from a value. */
export function isRefusal<T extends object>(it: T | Refusal): it is Refusal {
  return (it as Refusal).refused === true;
}
