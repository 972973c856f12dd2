export type QuarterTurn = 0 | 90 | 180 | 270;

/** Side of the square blocks in which a plane is turned: both the rows read and the rows written stay in cache. */
const block = 32;

/**
 * Turns a picture clockwise by a quarter, half or three-quarter turn.
 *
 * @param from row-major plane of `width` × `height` bytes without padding, as coded
 * @param to receives the upright plane, as many bytes; `height` wide for odd quarter turns
 */
export function turnUpright(from: Uint8Array, width: number, height: number, turn: QuarterTurn, to: Uint8Array): void {
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
