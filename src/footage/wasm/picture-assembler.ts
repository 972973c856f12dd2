import type { PictureTaker } from "../decoder.ts";
import { LumaTightener } from "../picture/tight-luma.ts";
import { greyDepth, lumaOfRgb } from "./luma-filter.ts";
import type { PictureLog, PictureNote } from "./picture-log.ts";

/**
 * Puts the core's output, which comes in pieces of any length, together to pictures, pairs them with their notes and
 * hands them on. Nothing may be thrown through the core: what a taker throws is kept for later.
 */
export class PictureAssembler {
  /** Whether the taker has had enough. */
  enough = false;
  /** What the taker threw. */
  thrown: { readonly error: unknown } | null = null;
  readonly #tightener = new LumaTightener();
  #bytes = new Uint8Array(0);
  #filled = 0;
  #luma = new Uint8Array(0);
  #note: PictureNote | null = null;

  constructor(
    readonly log: PictureLog,
    readonly ticksOf: (pts: number) => number,
    readonly taker: PictureTaker,
  ) {}

  /** Takes the next piece; false when no more is wanted. */
  take(piece: Uint8Array): boolean {
    try {
      for (let at = 0; at < piece.length; ) {
        this.#note ??= this.#begin();
        const part = piece.subarray(at, at + this.#bytes.length - this.#filled);
        this.#bytes.set(part, this.#filled);
        this.#filled += part.length;
        at += part.length;
        if (this.#filled === this.#bytes.length) {
          this.#hand(this.#note);
          this.#note = null;
        }
        if (this.enough) return false;
      }
      return true;
    } catch (error) {
      this.thrown = { error };
      return false;
    }
  }

  #begin(): PictureNote {
    const note = this.log.next();
    if (note === undefined) throw new Error("the core wrote a picture without saying its time");
    const pixels = note.width * note.height;
    const depth = greyDepth(note.format);
    const size = depth === null ? 3 * pixels : depth === 8 ? pixels : 2 * pixels;
    if (this.#bytes.length !== size) this.#bytes = new Uint8Array(size);
    this.#filled = 0;
    return note;
  }

  #hand({ pts, format, width, height }: PictureNote): void {
    const ticks = this.ticksOf(pts);
    if (!this.taker.wants(ticks)) return;
    const depth = greyDepth(format);
    const bitDepth = depth ?? 8;
    const luma = depth === null ? this.#fromRgb(width * height) : this.#tight(width, height, bitDepth);
    this.enough = this.taker.take({ ticks, width, height, bitDepth, luma }) === "enough";
  }

  #tight(width: number, height: number, bitDepth: number): Uint8Array {
    const stride = bitDepth === 8 ? width : 2 * width;
    return this.#tightener.tighten({ bytes: this.#bytes, offset: 0, stride, width, height, bitDepth });
  }

  #fromRgb(pixels: number): Uint8Array {
    if (this.#luma.length !== pixels) this.#luma = new Uint8Array(pixels);
    lumaOfRgb(this.#bytes, this.#luma);
    return this.#luma;
  }
}
