/** A grey picture as a canvas to draw from: `grey` is row-major, one byte a pixel. */
export function greyCanvas(width: number, height: number, grey: Uint8Array): HTMLCanvasElement {
  const canvas = document.createElement("canvas");
  canvas.width = width;
  canvas.height = height;
  const pixels = new ImageData(width, height);
  for (let i = 0; i < grey.length; i++) {
    const value = grey[i]!;
    pixels.data.set([value, value, value, 255], 4 * i);
  }
  canvas.getContext("2d")!.putImageData(pixels, 0, 0);
  return canvas;
}
