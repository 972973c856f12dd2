import type { Appetite, Frame } from "../quantities/index.ts";

/** A frame that was kept: its own copy of the luma. */
export interface Sample {
  readonly index: number;
  readonly t_s: number;
  readonly luma: Uint8Array;
}

/** Most samples kept for the background. */
const mostSamples = 48;
/** Bytes of luma kept at most, so that what was looked at need not be decoded again. */
const budgetBytes = 400 * 1024 * 1024;
/** A scene learnt from less than this would take slow cells for debris, seconds. */
const shortestSpan_s = 3;

/**
 * First look at a recording: keeps frames spread evenly over its first stretch, from which the still background is
 * learnt, and all frames of that stretch as long as they fit in memory.
 *
 * Feed frames to `take` until it has had enough; then `samples` holds at most 48, evenly spaced, and `everyFrame` all
 * frames taken, or null when they were too many to keep.
 */
export class Survey {
  private kept: Sample[] = [];
  private all: Sample[] | null = [];
  private stride = 1;
  private seen = 0;
  private readonly span_s: number;
  private readonly budget: number;
  private size = { width: 0, height: 0 };

  constructor(span_s: number, budget = budgetBytes) {
    this.span_s = span_s;
    this.budget = budget;
  }

  take(frame: Frame): Appetite {
    this.size = { width: frame.width, height: frame.height };
    const wanted = this.seen % this.stride === 0;
    if (wanted || this.all) {
      const sample = { index: frame.index, t_s: frame.t_s, luma: frame.luma.slice() };
      this.all?.push(sample);
      if (wanted) this.keep(sample);
    }
    this.seen++;
    if (frame.t_s > this.span_s && this.seen >= mostSamples) return "enough";
    const full = this.all !== null && (this.all.length + 1) * frame.luma.length > this.budget;
    if (full && frame.t_s >= shortestSpan_s && this.seen >= mostSamples) return "enough";
    if (full) this.all = null;
    return "more";
  }

  get width(): number {
    return this.size.width;
  }

  get height(): number {
    return this.size.height;
  }

  get samples(): readonly Sample[] {
    return this.kept;
  }

  /** All frames taken, in order, or null when they were too many to keep. */
  get everyFrame(): readonly Sample[] | null {
    return this.all;
  }

  /** Hands over all frames taken (null when they were too many) and keeps none, so that memory is free again. */
  release(): readonly Sample[] | null {
    const { all } = this;
    this.all = null;
    this.kept = [];
    return all;
  }

  private keep(sample: Sample): void {
    this.kept.push(sample);
    if (this.kept.length <= mostSamples) return;
    // Twice as far apart from here on: the spacing stays even whatever the length.
    this.stride *= 2;
    this.kept = this.kept.filter((_, i) => i % 2 === 0);
  }
}
