import {type RunView} from '#sim-core/index';
import {
  hang,
  hangBy,
  type Hanging,
  type Point,
  type Stretch,
  tangent,
  type Wheel,
} from './geometry';
import {type Layout} from './layout';

/** What of a stand the drawing needs. Lengths [m]. */
export interface StandShape {
  readonly coreRadiusM: number;
  /** Largest roll: fills the drawing. */
  readonly fullRadiusM: number;
  readonly thicknessM: number;
}

/** Everything that moves, as the drawing has it now [px, degrees]. */
export interface Drawn {
  readonly rollR: number;
  readonly rollDeg: number;
  readonly coreR: number;
  /** Path of the web; two pieces when it is broken. */
  readonly web: string;
  readonly webWidth: number;
  /** Drawn radius of the brake disc. */
  readonly brakeR: number;
  /** Part of the arc covered by the brake's output, 0 … 1. */
  readonly brakeShare: number;
}

/** Share of the set point below which the web is drawn sagging by its own weight. */
const LOOSE_BELOW = 0.3;
const OWN_SAG_PX = 7;
/** Slack from which it is drawn as a loop of its true length; below, the own sag shows that the web is loose. */
const LOOP_FROM_PX = 1;

/**
 * Draws a view: roll to scale, web straight, sagging by its slack, or parted. `fallen` is how far the ends of a
 * broken web have come down, 0 … 1.
 */
export function draw(
  layout: Layout,
  shape: StandShape,
  view: RunView,
  isBroken: boolean,
  fallen = 1,
): Drawn {
  const scale = layout.fullRollR / shape.fullRadiusM;
  const rollR = view.radiusM * scale;
  const coreR = shape.coreRadiusM * scale;
  const roll: Wheel = {...layout.roll, r: rollR, side: 'over'};
  const stretches: Stretches = [
    tangent(roll, layout.idlerIn),
    tangent(layout.idlerIn, layout.cell),
    tangent(layout.cell, layout.idlerOut),
    tangent(layout.idlerOut, layout.nip),
  ];
  const pull = view.tensionN / Math.max(1, view.setPointN);
  return {
    rollR,
    rollDeg: (view.rollRad * 180) / Math.PI,
    coreR,
    web: isBroken
      ? parted(layout, stretches, fallen)
      : whole(layout, roll, stretches, view.slackM * scale, pull),
    webWidth: 1.8 + 1.2 * Math.min(1, pull),
    brakeR: Math.max(coreR + 5, Math.min(0.27 * layout.fullRollR, 0.6 * rollR)),
    brakeShare: Math.max(0, Math.min(1, view.outputPct / 100)),
  };
}

type Stretches = readonly [Stretch, Stretch, Stretch, Stretch];

function whole(
  layout: Layout,
  roll: Wheel,
  stretches: Stretches,
  slackPx: number,
  pull: number,
): string {
  const [first, ...others] = stretches;
  const wheels = [layout.idlerIn, layout.cell, layout.idlerOut];
  const ownSag = 2 * OWN_SAG_PX * Math.max(0, 1 - pull / LOOSE_BELOW);
  // The loop hangs where it forms: between roll and first idler, and is longer than the straight by the slack.
  const {from, control, to} =
    slackPx > LOOP_FROM_PX
      ? onFloor(hang(roll, layout.idlerIn, slackPx), layout.floor)
      : hangBy(roll, layout.idlerIn, first, ownSag);
  let path = `M${at(from)} Q${at(control)} ${at(to)}`;
  others.forEach((stretch, place) => {
    path += `${around(wheels[place]!, stretch.from)} L${at(stretch.to)}`;
  });
  return `${path} H${layout.end}`;
}

/** What of a long loop would hang below the floor lies on it. */
function onFloor({from, control, to, excess}: Hanging, floor: number): Hanging {
  const lowestControl = 2 * (floor - 2) - (from.y + to.y) / 2;
  return {from, control: {x: control.x, y: Math.min(control.y, lowestControl)}, to, excess};
}

/** After a break, which is drawn before the load cell, both ends fall from the idlers that hold them. */
function parted(layout: Layout, [first, inner, outer, last]: Stretches, fallen: number): string {
  const {idlerIn, idlerOut, floor} = layout;
  const left = tornEnd(
    inner.from,
    between(inner.from, inner.to, 0.45),
    {x: idlerIn.x + idlerIn.r + 3, y: floor - 26},
    fallen,
  );
  const right = tornEnd(
    outer.to,
    between(outer.from, outer.to, 0.4),
    {x: idlerOut.x - idlerOut.r - 4, y: floor - 10},
    fallen,
  );
  return (
    `M${at(first.from)} L${at(first.to)}${around(idlerIn, inner.from)}${left}` +
    ` M${at(outer.to)}${right} M${at(outer.to)}${around(idlerOut, last.from)} L${at(last.to)} H${layout.end}`
  );
}

/** A torn end on its way from where it tore to where it hangs, with a curl at its tip. */
function tornEnd(from: Point, torn: Point, down: Point, fallen: number): string {
  const end = between(torn, down, fallen);
  const side = Math.sign(torn.x - from.x);
  const bulge = {x: between(from, end, 0.5).x + side * 12 * fallen, y: between(from, end, 0.55).y};
  const curl = 9 * fallen;
  return (
    ` Q${at(bulge)} ${at(end)}` +
    ` q${(side * curl).toFixed(2)} ${curl.toFixed(2)} ${(side * 1.4 * curl).toFixed(2)} ${(-0.5 * curl).toFixed(2)}`
  );
}

function between(from: Point, to: Point, share: number): Point {
  return {x: from.x + (to.x - from.x) * share, y: from.y + (to.y - from.y) * share};
}

/** Along a wheel to where the next stretch leaves it; nothing when the web only touches. */
function around(wheel: Wheel, to: Point): string {
  const sweep = wheel.side === 'over' ? 1 : 0;
  return ` A${wheel.r} ${wheel.r} 0 0 ${sweep} ${at(to)}`;
}

function at(point: Point): string {
  return `${point.x.toFixed(2)} ${point.y.toFixed(2)}`;
}
