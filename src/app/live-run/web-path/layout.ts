import {type Wheel} from './geometry';

export type LabelPlace = 'brake' | 'diameter' | 'tension' | 'truth' | 'speed';

/** Where a value is written, and from where a fine line leads to what it belongs to [px]. */
export interface LabelSpot {
  readonly x: number;
  readonly y: number;
  readonly anchor: 'start' | 'middle' | 'end';
  readonly leader: string;
}

/** Where things stand on the sheet. One unit is one pixel, so that lines and words keep their size. */
export interface Layout {
  readonly width: number;
  /** Whether values stand under the drawing. */
  readonly isNarrow: boolean;
  readonly height: number;
  readonly roll: {readonly x: number; readonly y: number};
  /** Drawn radius of the largest roll of the stand. */
  readonly fullRollR: number;
  readonly idlerIn: Wheel;
  readonly cell: Wheel;
  readonly idlerOut: Wheel;
  /** Lower nip roller; the web lies on its top. */
  readonly nip: Wheel;
  /** Where the web leaves the sheet. */
  readonly end: number;
  readonly floor: number;
  readonly labels: Readonly<Record<LabelPlace, LabelSpot>>;
}

/** Below this width values stand under the drawing. */
const NARROW_BELOW_PX = 700;
const LEAST_WIDTH_PX = 280;

/** Lays the stand out over the width there is. */
export function layoutFor(width: number): Layout {
  return width < NARROW_BELOW_PX ? narrow(Math.max(LEAST_WIDTH_PX, width)) : wide(width);
}

function wide(width: number): Layout {
  // Wider sheets give longer spans, not larger rolls, until both look lost.
  const at = (share: number): number => Math.round(share * width);
  const roll = {x: Math.max(206, at(0.225)), y: 110};
  const idlerIn = {x: at(0.49), y: 58, r: 13, side: 'over'} as const;
  const cell = {x: at(0.592), y: 154, r: 19, side: 'under'} as const;
  const idlerOut = {x: at(0.71), y: 58, r: 13, side: 'over'} as const;
  const nip = {x: at(0.87), y: 100, r: 24, side: 'over'} as const;
  const fullRollR = 92;
  return {
    width,
    isNarrow: false,
    height: 230,
    roll,
    fullRollR,
    idlerIn,
    cell,
    idlerOut,
    nip,
    end: width - 6,
    floor: 212,
    labels: {
      brake: {
        x: roll.x - fullRollR - 22,
        y: 160,
        anchor: 'end',
        leader: `M${roll.x - fullRollR - 18} 154L${roll.x - 22} ${roll.y + 10}`,
      },
      diameter: {x: roll.x + fullRollR + 14, y: 178, anchor: 'start', leader: ''},
      tension: {x: cell.x + 30, y: 172, anchor: 'start', leader: ''},
      truth: {x: idlerOut.x + 36, y: 118, anchor: 'start', leader: `M${idlerOut.x + 64} 94v-18`},
      speed: {x: width - 6, y: 172, anchor: 'end', leader: ''},
    },
  };
}

function narrow(width: number): Layout {
  const at = (share: number): number => Math.round(share * width);
  const fullRollR = Math.round(Math.min(84, 0.2 * width));
  const column = (place: number): number => Math.round(4 + [0, 0.4, 0.7][place]! * (width - 8));
  const label = (place: number, y: number): LabelSpot => ({
    x: column(place),
    y,
    anchor: 'start',
    leader: '',
  });
  return {
    width,
    isNarrow: true,
    height: 284,
    roll: {x: fullRollR + 12, y: 100},
    fullRollR,
    idlerIn: {x: at(0.53), y: 46, r: 9, side: 'over'},
    cell: {x: at(0.645), y: 124, r: 12, side: 'under'},
    idlerOut: {x: at(0.76), y: 46, r: 9, side: 'over'},
    nip: {x: at(0.905), y: 74, r: 15, side: 'over'},
    end: width - 2,
    floor: 188,
    labels: {
      tension: label(0, 218),
      brake: label(1, 218),
      speed: label(2, 218),
      diameter: label(0, 258),
      truth: label(1, 258),
    },
  };
}
