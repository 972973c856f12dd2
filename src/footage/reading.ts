import type { Appetite, Frame, Warning } from "../quantities/index.ts";
import type { DecodedPicture, PictureTaker } from "./decoder.ts";
import { fingerprint } from "./picture/fingerprint.ts";
import { standUpright } from "./picture/upright.ts";
import { type Recording, seconds } from "./recording.ts";
import { sizeChanges } from "./refusals.ts";
import { cutOff, framesMissing, framesRepeated, outOfOrder } from "./warnings.ts";

/** The pictures delivered so far, enough to tell whether another decoder gives the same ones. */
interface Trace {
  readonly ticks: number[];
  readonly fingerprints: number[];
}

/**
 * One pass over the recording: makes frames of decoded pictures (upright, numbered, in capture time) and hands them
 * to the receiver. When the decoder gives up half-way another one starts anew from the first picture; `again` then
 * skips what was delivered, after checking that it is the same to the last bit.
 */
export class Reading implements PictureTaker {
  stoppedEarly = false;
  framesRead = 0;
  /** False as soon as the second decoder's pictures differ from those delivered. */
  sameAgain = true;
  readonly repeatedFrames: number[] = [];
  readonly #trace: Trace = { ticks: [], fingerprints: [] };
  #first: number | null = null;
  #last = Number.NEGATIVE_INFINITY;
  #late = 0;
  #size: { width: number; height: number } | null = null;
  #upright = new Uint8Array(0);
  /** Frames delivered before the present decoder began, and how many of them it has given again. */
  #before = 0;
  #seenAgain = 0;

  constructor(
    readonly recording: Recording,
    readonly timeFactor: number,
    readonly receive: (frame: Frame) => Appetite,
  ) {}

  /** To be called before another decoder starts from the first picture. */
  again(): void {
    this.#before = this.framesRead;
    this.#seenAgain = 0;
    this.#late = 0;
  }

  wants(ticks: number): boolean {
    return this.recording.keeps(ticks);
  }

  take(picture: DecodedPicture): Appetite {
    const { ticks, width, height } = picture;
    const again = this.#seenAgain < this.#before;
    if (ticks <= (again ? (this.#trace.ticks[this.#seenAgain - 1] ?? Number.NEGATIVE_INFINITY) : this.#last)) {
      this.#late++;
      return "more";
    }
    if (again) return this.#compare(picture, this.#seenAgain++);
    this.#size ??= { width, height };
    if (width !== this.#size.width || height !== this.#size.height)
      throw sizeChanges(this.recording.name, `${this.#size.width} × ${this.#size.height}`, `${width} × ${height}`);
    this.#last = ticks;
    this.#first ??= ticks;
    const print = fingerprint(picture.luma);
    if (print === this.#trace.fingerprints.at(-1)) this.repeatedFrames.push(this.framesRead);
    this.#trace.ticks.push(ticks);
    this.#trace.fingerprints.push(print);
    const frame = this.#frame(picture, ticks - this.#first);
    this.framesRead++;
    if (this.receive(frame) === "more") return "more";
    this.stoppedEarly = true;
    return "enough";
  }

  #compare({ ticks, luma }: DecodedPicture, index: number): Appetite {
    this.sameAgain = this.#trace.ticks[index] === ticks && this.#trace.fingerprints[index] === fingerprint(luma);
    return this.sameAgain ? "more" : "enough";
  }

  #frame(picture: DecodedPicture, ticks: number): Frame {
    const turn = this.recording.rotation_deg;
    const { luma: coded, width, height } = picture;
    const t_s = seconds(this.recording, ticks) * this.timeFactor;
    if (turn === 0) return { index: this.framesRead, t_s, width, height, luma: coded };
    if (this.#upright.length !== coded.length) this.#upright = new Uint8Array(coded.length);
    return { index: this.framesRead, t_s, ...standUpright(picture, turn, this.#upright) };
  }

  /** What was odd about the pass, once it is over. */
  warnings(): Warning[] {
    const { recording } = this;
    const warnings = this.#late > 0 ? [outOfOrder(this.#late)] : [];
    if (this.repeatedFrames.length > 0) warnings.push(framesRepeated(this.repeatedFrames.length, this.framesRead));
    if (this.stoppedEarly) return warnings;
    const expected = recording.ticks.length;
    const afterLast = recording.ticks.length - recording.ticks.findLastIndex((ticks) => ticks <= this.#last) - 1;
    const interval_s = recording.containerRate_hz === null ? 0 : 1 / recording.containerRate_hz;
    const read_s = seconds(recording, this.#last - this.#first!) + interval_s;
    const lost_s = recording.promised_s === null ? null : Math.max(0, recording.promised_s - read_s);
    const endLost = afterLast > 0 || recording.cutShort;
    if (endLost)
      warnings.push(
        cutOff(this.framesRead, expected, lost_s === null || lost_s === 0 ? null : lost_s * this.timeFactor),
      );
    const missing = expected - this.framesRead - this.#late - afterLast;
    if (missing > 0) warnings.push(framesMissing(missing, expected));
    return warnings;
  }
}
