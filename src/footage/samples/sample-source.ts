import type { InputVideoTrack } from "mediabunny";

/** What a decoder behind the demuxing library needs to know of its track. */
export interface SampleSource {
  readonly track: InputVideoTrack;
  readonly packets: number;
  /** Whether some packets hold pictures that are never shown. */
  readonly hidesPictures: boolean;
  /** Ticks of the track's own clock, before any edit list, of the library's time; and back. */
  ticksOf(timestamp_s: number): number;
  timestampOf(ticks: number): number;
}
