export interface Point {
  readonly x: number;
  readonly y: number;
}

/**
 * Follows an SVG path of absolute M, L, C, A, Z and returns points along it. Arcs after SVG 2,
 * appendix B.2.4 "Conversion from endpoint to center parameterization"
 * (https://www.w3.org/TR/SVG2/implnote.html#ArcConversionEndpointToCenter), unrotated.
 */
export function pointsAlong(path: string, steps = 2000): Point[] {
  const points: Point[] = [];
  for (const [, command, rest = ""] of path.matchAll(/([MLCAZ])([^MLCAZ]*)/g)) {
    const n = (rest.match(/-?\d+(?:\.\d+)?/g) ?? []).map(Number);
    const from = points.at(-1) ?? { x: 0, y: 0 };
    const share = Array.from({ length: steps }, (_, i) => (i + 1) / steps);
    if (command === "M" || command === "L") points.push({ x: n[0] ?? 0, y: n[1] ?? 0 });
    if (command === "A") points.push(...share.map(arc(from, n)));
    for (let i = 0; command === "C" && i < n.length; i += 6) {
      const start = points.at(-1) ?? from;
      points.push(...share.map(bezier(start, n.slice(i, i + 6))));
    }
  }
  return points;
}

function bezier(p: Point, [a = 0, b = 0, c = 0, d = 0, x = 0, y = 0]: number[]) {
  const mix = (s: number, p0: number, p1: number, p2: number, p3: number) =>
    (1 - s) ** 3 * p0 + 3 * (1 - s) ** 2 * s * p1 + 3 * (1 - s) * s ** 2 * p2 + s ** 3 * p3;
  return (s: number): Point => ({ x: mix(s, p.x, a, c, x), y: mix(s, p.y, b, d, y) });
}

function arc(p: Point, [rx0 = 0, ry0 = 0, , large = 0, sweep = 0, x = 0, y = 0]: number[]) {
  const [dx, dy] = [(p.x - x) / 2, (p.y - y) / 2];
  const grow = Math.max(1, Math.sqrt((dx / rx0) ** 2 + (dy / ry0) ** 2));
  const [rx, ry] = [rx0 * grow, ry0 * grow];
  const below = (rx * dy) ** 2 + (ry * dx) ** 2;
  const sign = large === sweep ? -1 : 1;
  const k = sign * Math.sqrt(Math.max(0, (rx * ry) ** 2 - below) / below);
  const [cx, cy] = [(k * rx * dy) / ry, (-k * ry * dx) / rx];
  const angle = (u: number, v: number) => Math.atan2((v - cy) / ry, (u - cx) / rx);
  const start = angle(dx, dy);
  let turn = angle(-dx, -dy) - start;
  if (sweep === 0 && turn > 0) turn -= 2 * Math.PI;
  if (sweep === 1 && turn < 0) turn += 2 * Math.PI;
  const [mx, my] = [(p.x + x) / 2, (p.y + y) / 2];
  return (s: number): Point => ({
    x: mx + cx + rx * Math.cos(start + s * turn),
    y: my + cy + ry * Math.sin(start + s * turn),
  });
}

/** The area within a closed line, by the shoelace formula. */
export function areaWithin(points: readonly Point[]): number {
  const twice = points.reduce((sum, p, i) => {
    const next = points[(i + 1) % points.length] ?? p;
    return sum + p.x * next.y - next.x * p.y;
  }, 0);
  return Math.abs(twice) / 2;
}
