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

/** Where a line of this direction touches a wheel whose top the web passes over. */
export function touchOver(wheel: Point & {readonly r: number}, directionRad: number): Point {
  return {
    x: wheel.x + wheel.r * Math.sin(directionRad),
    y: wheel.y - wheel.r * Math.cos(directionRad),
  };
}

/** Web that hangs between two wheels: where it leaves the first, hangs towards, and meets the second. */
export interface Hanging {
  readonly from: Point;
  readonly control: Point;
  readonly to: Point;
  /** Length along the wheels and the curve beyond the straight stretch [px]. */
  readonly excess: number;
}

/** The web between two wheels when it is `excess` longer than the straight stretch between them [px]. */
export function hang(a: Wheel, b: Wheel, excess: number): Hanging {
  const chord = tangent(a, b);
  let low = 0;
  let high = lengthOf(chord) + 2 * excess;
  for (let step = 0; step < 40; step++) {
    const middle = (low + high) / 2;
    if (hangBy(a, b, chord, middle).excess < excess) low = middle;
    else high = middle;
  }
  return hangBy(a, b, chord, (low + high) / 2);
}

/** The web whose curve is drawn towards a point `drop` below the middle of the straight stretch. */
export function hangBy(a: Wheel, b: Wheel, chord: Stretch, drop: number): Hanging {
  const control = {x: (chord.from.x + chord.to.x) / 2, y: (chord.from.y + chord.to.y) / 2 + drop};
  const straight = Math.atan2(chord.to.y - chord.from.y, chord.to.x - chord.from.x);
  let leaves = straight;
  let meets = straight;
  for (let round = 0; round < 6; round++) {
    const from = touchOver(a, leaves);
    const to = touchOver(b, meets);
    leaves = Math.atan2(control.y - from.y, control.x - from.x);
    meets = Math.atan2(to.y - control.y, to.x - control.x);
  }
  const from = touchOver(a, leaves);
  const to = touchOver(b, meets);
  // Web still on the roll lies farther round it; on the second wheel it lies on sooner.
  const onWheels = a.r * (leaves - straight) + b.r * (straight - meets);
  return {from, control, to, excess: onWheels + curveLength(from, control, to) - lengthOf(chord)};
}

/** Length of a quadratic curve [px]. */
export function curveLength(from: Point, control: Point, to: Point): number {
  const steps = 32;
  let length = 0;
  let last = from;
  for (let step = 1; step <= steps; step++) {
    const t = step / steps;
    const u = 1 - t;
    const point = {
      x: u * u * from.x + 2 * u * t * control.x + t * t * to.x,
      y: u * u * from.y + 2 * u * t * control.y + t * t * to.y,
    };
    length += Math.hypot(point.x - last.x, point.y - last.y);
    last = point;
  }
  return length;
}
