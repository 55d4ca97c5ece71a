import {type RunView} from '#sim-core/index';
import {controlOf, dropFor, type Point, type Stretch, tangent, type Wheel} from './geometry';
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
  /** Part of a turn covered by the brake's arc, 0 … 1. */
  readonly brakeShare: number;
}

/** Draws a view: roll to scale, web straight, sagging by its slack, or parted. */
export function draw(layout: Layout, shape: StandShape, view: RunView, isBroken: boolean): Drawn {
  const scale = layout.fullRollR / shape.fullRadiusM;
  const rollR = view.radiusM * scale;
  const roll: Wheel = {...layout.roll, r: rollR, side: 'over'};
  const stretches = [
    tangent(roll, layout.idlerIn),
    tangent(layout.idlerIn, layout.cell),
    tangent(layout.cell, layout.idlerOut),
    tangent(layout.idlerOut, layout.nip),
  ];
  return {
    rollR,
    rollDeg: (view.rollRad * 180) / Math.PI,
    coreR: shape.coreRadiusM * scale,
    web: isBroken ? parted(layout, stretches) : whole(layout, stretches, view.slackM * scale),
    webWidth: 1.6 + 1.6 * Math.min(1, view.tensionN / Math.max(1, view.setPointN)),
    brakeShare: Math.max(0, Math.min(1, view.outputPct / 100)),
  };
}

function whole(layout: Layout, stretches: readonly Stretch[], slackPx: number): string {
  const [first, ...others] = stretches as [Stretch, ...Stretch[]];
  const wheels = [layout.idlerIn, layout.cell, layout.idlerOut];
  let path = `M${at(first.from)}`;
  // The loop hangs where it forms: between roll and first idler. Its curve is longer than the line by the slack.
  const drop = dropFor(first, slackPx);
  path += drop > 0 ? ` Q${at(controlOf(first, drop))} ${at(first.to)}` : ` L${at(first.to)}`;
  others.forEach((stretch, place) => {
    path += `${around(wheels[place]!, stretch.from)} L${at(stretch.to)}`;
  });
  return `${path} H${layout.end}`;
}

/** After a break both ends hang from the last roller that holds them. */
function parted(layout: Layout, stretches: readonly Stretch[]): string {
  const [first, , , last] = stretches as [Stretch, Stretch, Stretch, Stretch];
  const end = first.from;
  const hang = layout.floor - 6;
  const torn = `M${at(end)} Q${end.x + 46} ${end.y + 10} ${end.x + 52} ${hang} l10 3`;
  const rest = `M${last.to.x - 96} ${hang} Q${last.to.x - 70} ${last.to.y + 30} ${at(last.to)} H${layout.end}`;
  return `${torn} ${rest}`;
}

function around(wheel: Wheel, to: Point): string {
  const sweep = wheel.side === 'over' ? 1 : 0;
  return ` A${wheel.r} ${wheel.r} 0 0 ${sweep} ${at(to)}`;
}

function at(point: Point): string {
  return `${point.x.toFixed(2)} ${point.y.toFixed(2)}`;
}
