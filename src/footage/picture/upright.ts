export type QuarterTurn = 0 | 90 | 180 | 270;

/** A plane of luma without padding, row-major. */
export interface Plane {
  readonly width: number;
  readonly height: number;
  readonly luma: Uint8Array;
}

/**
 * The picture turned clockwise until it stands upright.
 * @param memory receives the upright luma, as many bytes as the picture has
 */
export function standUpright({ width, height, luma }: Plane, turn: QuarterTurn, memory: Uint8Array): Plane {
  turnUpright(luma, width, height, turn, memory);
  const lies = turn === 90 || turn === 270;
  return { width: lies ? height : width, height: lies ? width : height, luma: memory };
}

/** Side of the square blocks in which a plane is turned: both the rows read and the rows written stay in cache. */
const block = 32;

/**
 * Turns a picture clockwise by a quarter, half or three-quarter turn.
 *
 * @param from row-major plane of `width` × `height` bytes without padding, as coded
 * @param to receives the upright plane, as many bytes; `height` wide for odd quarter turns
 */
function turnUpright(from: Uint8Array, width: number, height: number, turn: QuarterTurn, to: Uint8Array): void {
  if (turn === 0) {
    to.set(from.subarray(0, width * height));
    return;
  }
  if (turn === 180) {
    const last = width * height - 1;
    for (let i = 0; i <= last; i++) to[last - i] = from[i]!;
    return;
  }
  // Where pixel (x, y) goes: base + x * alongX + y * alongY.
  const [base, alongX, alongY] = turn === 90 ? [height - 1, height, -1] : [(width - 1) * height, -height, 1];
  for (let blockY = 0; blockY < height; blockY += block) {
    const endY = Math.min(blockY + block, height);
    for (let blockX = 0; blockX < width; blockX += block) {
      const endX = Math.min(blockX + block, width);
      for (let y = blockY; y < endY; y++) {
        let target = base + blockX * alongX + y * alongY;
        const row = y * width;
        for (let x = blockX; x < endX; x++) {
          to[target] = from[row + x]!;
          target += alongX;
        }
      }
    }
  }
}
