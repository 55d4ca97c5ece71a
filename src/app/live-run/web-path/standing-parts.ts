import {type Layout} from './layout';

/** Distance between two drawn laps [px]; a real roll has thousands, the eye wants a few. */
const LAP_PX = 4.5;
const HATCH_PX = 9;

/** A roller as it is drawn: its place, size and the way it turns. */
export interface DrawnWheel {
  readonly name: 'idler' | 'cell' | 'nip' | 'press';
  readonly x: number;
  readonly y: number;
  readonly r: number;
  readonly side: 'over' | 'under';
}

/** Everything of the drawing that stands still, made once for a width. */
export interface StandingParts {
  readonly atRoll: string;
  /** Radii of the laps that can be seen on the largest roll. */
  readonly laps: readonly number[];
  readonly wheels: readonly DrawnWheel[];
  readonly hatch: string;
  /** The side of the machine that carries idlers and load cell. */
  readonly plate: string;
  readonly frame: string;
  readonly pedestal: string;
  readonly loadCell: string;
  readonly arrow: string;
}

export function standingParts(layout: Layout, coreR: number): StandingParts {
  const {roll, idlerIn, cell, idlerOut, nip, fullRollR} = layout;
  const press: DrawnWheel = {
    name: 'press',
    x: nip.x,
    y: nip.y - 2 * nip.r,
    r: nip.r - 1,
    side: 'under',
  };
  const laps: number[] = [];
  for (let r = coreR + LAP_PX; r < fullRollR - 1; r += LAP_PX) laps.push(r);
  return {
    atRoll: `translate(${roll.x} ${roll.y})`,
    laps,
    wheels: [
      {name: 'idler', ...idlerIn},
      {name: 'cell', ...cell},
      {name: 'idler', ...idlerOut},
      {name: 'nip', ...nip},
      press,
    ],
    hatch: hatch(layout),
    plate: plate(layout),
    frame: nipFrame(layout),
    pedestal: pedestal(layout),
    loadCell: loadCell(layout),
    arrow: arrow(layout),
  };
}

function plate({idlerIn, idlerOut, floor}: Layout): string {
  const room = idlerIn.r * 1.9;
  const top = idlerIn.y - room;
  return (
    `M${idlerIn.x - room} ${floor}V${top + 10}a10 10 0 0 1 10-10H${idlerOut.x + room - 10}` +
    `a10 10 0 0 1 10 10V${floor}Z`
  );
}

function nipFrame({nip, floor}: Layout): string {
  const half = nip.r * 0.42;
  const top = nip.y - 3.3 * nip.r;
  return `M${nip.x - half} ${floor}V${top}H${nip.x + half}V${floor}M${nip.x} ${top}V${nip.y - 2 * nip.r}`;
}

/** The stand that carries the chuck: broad at the floor, a bearing at the top. */
function pedestal({roll, floor, fullRollR}: Layout): string {
  const foot = fullRollR * 0.42;
  const head = fullRollR * 0.13;
  return (
    `M${roll.x - foot} ${floor}C${roll.x - head * 1.6} ${floor - 24} ${roll.x - head} ${roll.y + 60} ${roll.x - head} ${roll.y}` +
    `a${head} ${head} 0 0 1 ${2 * head} 0C${roll.x + head} ${roll.y + 60} ${roll.x + head * 1.6} ${floor - 24} ${roll.x + foot} ${floor}Z`
  );
}

/** A block under the roller's bearing, on a post: what it feels is what the controller measures. */
function loadCell({cell, floor}: Layout): string {
  const top = cell.y + cell.r + 4;
  const half = cell.r * 0.85;
  const height = Math.min(11, floor - top - 6);
  return (
    `M${cell.x - half} ${top}h${2 * half}v${height}h${-2 * half}Z` +
    `M${cell.x} ${top + height}V${floor}M${cell.x - half} ${floor}h${2 * half}`
  );
}

function arrow({nip, end}: Layout): string {
  const y = nip.y - nip.r + 14;
  const from = Math.min(nip.x + nip.r + 12, end - 16);
  return `M${from} ${y}H${end - 2}m-7-4.5 7 4.5-7 4.5`;
}

function hatch({width, floor}: Layout): string {
  let path = '';
  for (let x = HATCH_PX; x < width; x += HATCH_PX) path += `M${x} ${floor + 2}l-6 7`;
  return path;
}
