/** Degrees clockwise by which a player has to turn the coded picture to stand it upright. */
export type Rotation = 0 | 90 | 180 | 270;

/** Turns upright luma into what is coded under a rotation tag, and grey levels into the codec's own range. */
export interface CodedPicture {
  readonly width: number;
  readonly height: number;
  /** 4:2:0 with grey chroma: luma, then two planes of 128. */
  readonly bytes: Uint8Array;
  /** Takes over one upright picture. */
  take(upright: Uint8Array): void;
}

/**
 * Makes the coded picture for upright pictures of the given size.
 * @param fullRange whether 0 … 255 is coded as it is; else it is squeezed into 16 … 235, as cameras do (ITU-R BT.709).
 */
export function codedPicture(width: number, height: number, rotation: Rotation, fullRange: boolean): CodedPicture {
  const across = rotation === 90 || rotation === 270;
  const codedWidth = across ? height : width;
  const codedHeight = across ? width : height;
  const luma = width * height;
  const bytes = new Uint8Array(luma + 2 * Math.ceil(width / 2) * Math.ceil(height / 2));
  bytes.fill(128, luma);
  const level = Uint8Array.from({ length: 256 }, (_, v) => (fullRange ? v : 16 + Math.round((219 * v) / 255)));
  // Where coded pixel (column 0, row 0) lies in the upright picture, and the step of a column and of a row there.
  const [origin, column, row] = {
    0: [0, 1, width],
    90: [width - 1, width, -1],
    180: [luma - 1, -1, -width],
    270: [(height - 1) * width, -width, 1],
  }[rotation] as [number, number, number];
  return {
    width: codedWidth,
    height: codedHeight,
    bytes,
    take(upright) {
      for (let r = 0, k = 0; r < codedHeight; r++) {
        let from = origin + r * row;
        for (let c = 0; c < codedWidth; c++, k++, from += column) {
          bytes[k] = level[upright[from] as number] as number;
        }
      }
    },
  };
}
