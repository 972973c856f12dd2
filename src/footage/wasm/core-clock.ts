import type { Recording } from "../recording.ts";
import type { TimeBase } from "./picture-log.ts";
import type { Probe } from "./probe.ts";

/**
 * Turns the core's times into the recording's ticks and back. The core may begin to count elsewhere than we do (it
 * shifts times so that they rise), which the time of the first packet tells, and in other units.
 */
export class CoreClock {
  /** Ticks of ours between the core's zero and ours. */
  readonly #shift: number;

  constructor(
    readonly recording: Recording,
    { packets: [packet], tick }: Probe,
  ) {
    const first = packet?.pts ?? packet?.dts;
    this.#shift = first === undefined ? 0 : recording.firstPacketTicks - this.#inOurTicks(first, tick);
  }

  /** The recording's ticks of a time of the core. */
  ticksOf(pts: number, unit: TimeBase): number {
    return this.#inOurTicks(pts, unit) + this.#shift;
  }

  /** The core's time of the recording's ticks, seconds. */
  coreTime_s(ticks: number): number {
    const { numerator, denominator } = this.recording.tick;
    return ((ticks - this.#shift) * numerator) / denominator;
  }

  #inOurTicks(pts: number, unit: TimeBase): number {
    const { tick } = this.recording;
    return Math.round((pts * unit.numerator * tick.denominator) / (unit.denominator * tick.numerator));
  }
}
