/** Where a dot of a swarm lies: its index in the data, along the axis, and to the side. */
export interface SwarmDot {
  readonly index: number;
  readonly along: number;
  readonly aside: number;
}

/**
 * Puts dots of one radius beside each other so that none overlaps another and each keeps its place along the axis.
 *
 * Dots go in order of `along`, each as near to the middle as is free. Null as soon as one lies further out than
 * `room`; {@link fittingSwarm} finds dots that fit.
 */
export function swarm(along: readonly number[], radius: number, room = Number.POSITIVE_INFINITY): SwarmDot[] | null {
  const order = along.map((_, i) => i).sort((a, b) => along[a]! - along[b]! || a - b);
  const placed: SwarmDot[] = [];
  let firstNear = 0;
  for (const index of order) {
    const x = along[index]!;
    while (firstNear < placed.length && x - placed[firstNear]!.along >= 2 * radius) firstNear++;
    const near = placed.slice(firstNear);
    const aside = nearestFree(x, near, radius);
    if (Math.abs(aside) + radius > room) return null;
    placed.push({ index, along: x, aside });
  }
  return placed;
}

/** The largest of `radii` whose swarm stays within ± `room`; with the smallest, dots too far out are put on the edge. */
export function fittingSwarm(
  along: readonly number[],
  radii: readonly number[],
  room: number,
): { radius: number; dots: SwarmDot[] } {
  for (const radius of radii) {
    const dots = swarm(along, radius, room);
    if (dots) return { radius, dots };
  }
  const radius = radii[radii.length - 1]!;
  const edge = room - radius;
  const dots = swarm(along, radius)!.map((dot) => ({ ...dot, aside: Math.max(-edge, Math.min(edge, dot.aside)) }));
  return { radius, dots };
}

function nearestFree(x: number, near: readonly SwarmDot[], radius: number): number {
  const blocked = near.map((dot) => {
    const dx = x - dot.along;
    const reach = Math.sqrt(Math.max(0, 4 * radius * radius - dx * dx));
    return [dot.aside - reach, dot.aside + reach] as const;
  });
  const isFree = (y: number) => blocked.every(([low, high]) => y <= low + 1e-9 || y >= high - 1e-9);
  const candidates = [0, ...blocked.flat()].sort((a, b) => Math.abs(a) - Math.abs(b) || b - a);
  return candidates.find(isFree) ?? 0;
}
