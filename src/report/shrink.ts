/** A grey picture, row-major, one byte a pixel. */
export interface GreyPicture {
  readonly width: number;
  readonly height: number;
  readonly grey: Uint8Array;
}

/** The picture made at most `maxWidth` wide, each new pixel the mean of the old ones it covers (area weighted). */
export function shrink({ width, height, grey }: GreyPicture, maxWidth: number): GreyPicture {
  if (width <= maxWidth) return { width, height, grey };
  const newHeight = Math.max(1, Math.round((height * maxWidth) / width));
  const across = spans(width, maxWidth);
  const down = spans(height, newHeight);
  const out = new Uint8Array(maxWidth * newHeight);
  for (const [y, rows] of down.entries()) {
    for (const [x, columns] of across.entries()) {
      let sum = 0;
      let area = 0;
      for (const row of rows) {
        for (const column of columns) {
          const weight = row.weight * column.weight;
          sum += weight * grey[row.index * width + column.index]!;
          area += weight;
        }
      }
      out[y * maxWidth + x] = Math.round(sum / area);
    }
  }
  return { width: maxWidth, height: newHeight, grey: out };
}

/** For each of `to` equal stretches of a line of `from` pixels: the pixels it covers and how much of each. */
function spans(from: number, to: number): { index: number; weight: number }[][] {
  const step = from / to;
  return Array.from({ length: to }, (_, i) => {
    const start = i * step;
    const end = Math.min(from, start + step);
    const covered = [];
    for (let index = Math.floor(start); index < end; index++) {
      covered.push({ index, weight: Math.min(end, index + 1) - Math.max(start, index) });
    }
    return covered;
  });
}
