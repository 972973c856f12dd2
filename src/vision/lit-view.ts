/** The lit circle of an eyepiece in the picture, pixels. */
export interface Circle {
  readonly x: number;
  readonly y: number;
  readonly radius: number;
}

const rays = 180;

/**
 * Finds the lit circle of an eyepiece in a still picture, or returns null when the whole frame is lit.
 *
 * The corners must be dark and the middle lit. Along rays from the middle of the lit pixels the rim is where the level
 * falls through half; a circle is fitted to the rim points (algebraic least squares, I. Kåsa 1976) with outliers left
 * out, and accepted when most rays that meet a rim agree with it.
 */
export function findLitCircle(picture: Float32Array, width: number, height: number): Circle | null {
  const step = Math.max(1, Math.floor(Math.min(width, height) / 240));
  const levels: number[] = [];
  for (let y = 0; y < height; y += step) for (let x = 0; x < width; x += step) levels.push(picture[y * width + x]!);
  levels.sort((a, b) => a - b);
  const bright = levels[Math.floor(levels.length * 0.8)]!;
  const half = bright / 2;
  if (bright < 30) return null;
  const darkCorners = [
    [0, 0],
    [width - 1, 0],
    [0, height - 1],
    [width - 1, height - 1],
  ].filter(([x, y]) => meanAround(picture, width, height, x!, y!) < 0.35 * bright).length;
  if (darkCorners < 2) return null;

  let sx = 0;
  let sy = 0;
  let n = 0;
  for (let y = 0; y < height; y += step) {
    for (let x = 0; x < width; x += step) {
      if (picture[y * width + x]! > half) {
        sx += x;
        sy += y;
        n++;
      }
    }
  }
  if (n === 0) return null;
  let circle: Circle | null = { x: sx / n, y: sy / n, radius: 0 };
  for (let round = 0; round < 3 && circle; round++) circle = fitRim(picture, width, height, circle, half);
  if (!circle || circle.radius < 0.15 * Math.min(width, height)) return null;
  return circle;
}

function fitRim(picture: Float32Array, width: number, height: number, from: Circle, half: number): Circle | null {
  let points: { x: number; y: number }[] = [];
  for (let k = 0; k < rays; k++) {
    const angle = (2 * Math.PI * k) / rays;
    const c = Math.cos(angle);
    const s = Math.sin(angle);
    // From outside inwards: a dark cell or speck near the rim doesn't end the ray early.
    let previous: number | null = null;
    for (let r = Math.ceil(Math.sqrt(width * width + height * height)); r > 4; r--) {
      const x = Math.round(from.x + r * c);
      const y = Math.round(from.y + r * s);
      if (x < 1 || y < 1 || x > width - 2 || y > height - 2) continue;
      const level = picture[y * width + x]!;
      if (level > half) {
        if (previous !== null) {
          const part = (level - half) / Math.max(1e-6, level - previous);
          points.push({ x: from.x + (r + part) * c, y: from.y + (r + part) * s });
        }
        break;
      }
      previous = level;
    }
  }
  if (points.length < rays / 4) return null;
  let circle = kasa(points);
  for (let round = 0; round < 4; round++) {
    const off = points.map((p) => Math.abs(distance(p, circle) - circle.radius)).sort((a, b) => a - b);
    const tolerance = Math.max(2, 3 * off[off.length >> 1]!);
    const agreeing = points.filter((p) => Math.abs(distance(p, circle) - circle.radius) <= tolerance);
    if (agreeing.length < rays / 4) return null;
    points = agreeing;
    circle = kasa(points);
  }
  const off = points.map((p) => Math.abs(distance(p, circle) - circle.radius)).sort((a, b) => a - b);
  return off[Math.floor(off.length * 0.8)]! < Math.max(3, 0.02 * circle.radius) ? circle : null;
}

function distance(p: { x: number; y: number }, c: Circle): number {
  return Math.sqrt((p.x - c.x) ** 2 + (p.y - c.y) ** 2);
}

/** Least-squares circle in closed form: x² + y² = 2ax + 2by + c. */
function kasa(points: readonly { x: number; y: number }[]): Circle {
  const n = points.length;
  const mx = points.reduce((s, p) => s + p.x, 0) / n;
  const my = points.reduce((s, p) => s + p.y, 0) / n;
  let suu = 0;
  let suv = 0;
  let svv = 0;
  let bu = 0;
  let bv = 0;
  for (const p of points) {
    const u = p.x - mx;
    const v = p.y - my;
    const q = u * u + v * v;
    suu += u * u;
    suv += u * v;
    svv += v * v;
    bu += (u * q) / 2;
    bv += (v * q) / 2;
  }
  const det = suu * svv - suv * suv;
  const a = (svv * bu - suv * bv) / det;
  const b = (suu * bv - suv * bu) / det;
  return { x: mx + a, y: my + b, radius: Math.sqrt(a * a + b * b + (suu + svv) / n) };
}

function meanAround(picture: Float32Array, width: number, height: number, cx: number, cy: number): number {
  let sum = 0;
  let n = 0;
  for (let y = Math.max(0, cy - 6); y <= Math.min(height - 1, cy + 6); y++) {
    for (let x = Math.max(0, cx - 6); x <= Math.min(width - 1, cx + 6); x++) {
      sum += picture[y * width + x]!;
      n++;
    }
  }
  return sum / n;
}

/** Marks pixels in the lit view: 1 within the circle less `margin` pixels, or everywhere when there is no circle. */
export function viewMask(width: number, height: number, circle: Circle | null, margin: number): Uint8Array {
  const mask = new Uint8Array(width * height);
  if (!circle) return mask.fill(1);
  const r = circle.radius - margin;
  for (let y = 0; y < height; y++) {
    for (let x = 0; x < width; x++) {
      if ((x - circle.x) ** 2 + (y - circle.y) ** 2 <= r * r) mask[y * width + x] = 1;
    }
  }
  return mask;
}

/** A cell nearer to the rim than this is half in the dark, pixels. */
const leastMargin_px = 3;
/** Rings of the rim are given up while their variance over what noise explains is above this. */
const calmRim = 1.6;

/**
 * How far inside the rim the view becomes as calm as noise allows, pixels: at most `most`. What shakes against the rim
 * leaves residues there that would look like cells; where rim and scene shake together, next to nothing is lost.
 */
export function rimMargin(
  still: { readonly noise: Float32Array; readonly own: Float32Array },
  width: number,
  height: number,
  circle: Circle,
  most: number,
): number {
  const rings = Math.ceil(most);
  const spread = new Float64Array(rings + 1);
  const explained = new Float64Array(rings + 1);
  for (let y = 0; y < height; y++) {
    for (let x = 0; x < width; x++) {
      const depth = circle.radius - distance({ x, y }, circle);
      if (depth < 0 || depth > rings) continue;
      const ring = Math.floor(depth);
      const i = y * width + x;
      spread[ring]! += still.own[i]! * still.own[i]!;
      explained[ring]! += still.noise[i]! * still.noise[i]!;
    }
  }
  let margin = leastMargin_px;
  for (let ring = 0; ring <= rings; ring++) {
    if (spread[ring]! > calmRim * explained[ring]!) margin = Math.max(margin, ring + 2);
  }
  return Math.min(margin, most);
}
