import type { Failure } from "./failure.ts";
import type { Ready } from "./port.ts";

/** What a pictures worker is asked: open one recording first, then show frames of it, one request at a time. */
export type PicturesOrder =
  | { readonly type: "open"; readonly recording: File; readonly captureFps: number | null }
  | { readonly type: "show"; readonly frame: number };

/** Size of the upright picture, and the capture time of every frame in seconds from the first. */
export interface OpenedPictures {
  readonly width: number;
  readonly height: number;
  readonly times_s: Float64Array;
  /** As results name it. */
  readonly decoder: string;
}

/** What a pictures worker says. `bitmap` belongs to the receiver, who closes it; it is null when the frame can't
 * be decoded. */
export type PicturesNews =
  | Ready
  | { readonly type: "opened"; readonly pictures: OpenedPictures }
  | { readonly type: "shown"; readonly frame: number; readonly bitmap: ImageBitmap | null }
  | { readonly type: "failed"; readonly failure: Failure };
