/** A point of the drawing [px]. */
export interface Point {
  readonly x: number;
  readonly y: number;
}

/** A roller of the drawing; the web passes over its top or under its bottom. */
export interface Wheel extends Point {
  readonly r: number;
  readonly side: 'over' | 'under';
}

/** A straight stretch of web between two wheels. */
export interface Stretch {
  readonly from: Point;
  readonly to: Point;
}

/** The web's line from wheel to wheel, left to right, touching each on its side. */
export function tangent(a: Wheel, b: Wheel): Stretch {
  // On the screen y points down: "over" touches at −r, "under" at +r across the web's direction.
  const ra = a.side === 'over' ? -a.r : a.r;
  const rb = b.side === 'over' ? -b.r : b.r;
  const distance = Math.hypot(b.x - a.x, b.y - a.y);
  const direction = Math.atan2(b.y - a.y, b.x - a.x);
  const lean = Math.asin(Math.max(-1, Math.min(1, (ra - rb) / distance)));
  const normal = direction - lean + Math.PI / 2;
  return {
    from: {x: a.x + ra * Math.cos(normal), y: a.y + ra * Math.sin(normal)},
    to: {x: b.x + rb * Math.cos(normal), y: b.y + rb * Math.sin(normal)},
  };
}

/** Length of a stretch [px]. */
export function lengthOf({from, to}: Stretch): number {
  return Math.hypot(to.x - from.x, to.y - from.y);
}

/** Length of a quadratic curve whose control point lies `drop` below the middle of a chord [px]. */
export function curveLength({from, to}: Stretch, drop: number): number {
  const steps = 32;
  let length = 0;
  let last: Point = from;
  for (let step = 1; step <= steps; step++) {
    const point = pointOn(from, to, drop, step / steps);
    length += Math.hypot(point.x - last.x, point.y - last.y);
    last = point;
  }
  return length;
}

/** How far below the chord the control point must lie for the curve to be `excess` longer than it [px]. */
export function dropFor(chord: Stretch, excess: number): number {
  if (excess <= 0) return 0;
  const straight = lengthOf(chord);
  let low = 0;
  let high = 2 * (straight + excess);
  for (let step = 0; step < 40; step++) {
    const middle = (low + high) / 2;
    if (curveLength(chord, middle) - straight < excess) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

/** The control point's place for a given drop. */
export function controlOf({from, to}: Stretch, drop: number): Point {
  return {x: (from.x + to.x) / 2, y: (from.y + to.y) / 2 + drop};
}

function pointOn(from: Point, to: Point, drop: number, t: number): Point {
  const control = controlOf({from, to}, drop);
  const u = 1 - t;
  return {
    x: u * u * from.x + 2 * u * t * control.x + t * t * to.x,
    y: u * u * from.y + 2 * u * t * control.y + t * t * to.y,
  };
}
