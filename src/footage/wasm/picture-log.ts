/** What the core's filter says of one picture it lets through: time (ticks of the filter's clock), format and size. */
export interface PictureNote {
  readonly pts: number;
  /** `gray`, `gray10le`, `rgb24`, … */
  readonly format: string;
  readonly width: number;
  readonly height: number;
}

/** Seconds a tick of the filter's clock lasts. */
export interface TimeBase {
  readonly numerator: number;
  readonly denominator: number;
}

const clockLine = /config in time_base: (\d+)\/(\d+)/;
const pictureLine = /\bn: *\d+ pts: *(-?\d+) .*? fmt:(\w+) .*? s:(\d+)x(\d+) /;

/** Reads the lines of the core's `showinfo` filter. They run some pictures ahead of the pictures themselves. */
export class PictureLog {
  clock: TimeBase = { numerator: 1, denominator: 1 };
  #notes: PictureNote[] = [];
  #taken = 0;

  /** Takes one message of the core's log, which may be of anything. */
  read(message: string): void {
    const picture = pictureLine.exec(message);
    if (picture) {
      const [, pts, format, width, height] = picture;
      this.#notes.push({ pts: Number(pts), format: format!, width: Number(width), height: Number(height) });
      return;
    }
    const clock = clockLine.exec(message);
    if (clock) this.clock = { numerator: Number(clock[1]), denominator: Number(clock[2]) };
  }

  /** The note of the next picture, in the order in which they come out; undefined when there is none yet. */
  next(): PictureNote | undefined {
    const note = this.#notes[this.#taken];
    if (note === undefined) return undefined;
    this.#taken++;
    if (this.#taken > 256) {
      this.#notes = this.#notes.slice(this.#taken);
      this.#taken = 0;
    }
    return note;
  }
}
