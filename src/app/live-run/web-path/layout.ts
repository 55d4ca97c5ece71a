import {type Wheel} from './geometry';

/** Where things stand on the sheet [px of the view box]. */
export interface Layout {
  readonly width: number;
  readonly height: number;
  readonly roll: {readonly x: number; readonly y: number};
  /** Drawn radius of the largest roll of the stand. */
  readonly fullRollR: number;
  readonly idlerIn: Wheel;
  readonly cell: Wheel;
  readonly idlerOut: Wheel;
  /** Lower nip roller; the web lies on its top. */
  readonly nip: Wheel;
  readonly end: number;
  readonly floor: number;
  readonly labels: Readonly<
    Record<
      'brake' | 'diameter' | 'tension' | 'truth' | 'speed',
      {x: number; y: number; anchor: 'start' | 'middle' | 'end'}
    >
  >;
}

export const WIDE: Layout = {
  width: 1200,
  height: 262,
  roll: {x: 330, y: 128},
  fullRollR: 104,
  idlerIn: {x: 560, y: 60, r: 15, side: 'over'},
  cell: {x: 672, y: 182, r: 20, side: 'under'},
  idlerOut: {x: 784, y: 60, r: 15, side: 'over'},
  nip: {x: 990, y: 96, r: 26, side: 'over'},
  end: 1110,
  floor: 246,
  labels: {
    brake: {x: 196, y: 128, anchor: 'end'},
    diameter: {x: 452, y: 206, anchor: 'start'},
    tension: {x: 716, y: 196, anchor: 'start'},
    truth: {x: 850, y: 196, anchor: 'start'},
    speed: {x: 1040, y: 148, anchor: 'start'},
  },
};

export const NARROW: Layout = {
  width: 480,
  height: 330,
  roll: {x: 112, y: 128},
  fullRollR: 92,
  idlerIn: {x: 236, y: 62, r: 12, side: 'over'},
  cell: {x: 292, y: 158, r: 15, side: 'under'},
  idlerOut: {x: 348, y: 62, r: 12, side: 'over'},
  nip: {x: 424, y: 84, r: 20, side: 'over'},
  end: 476,
  floor: 230,
  labels: {
    brake: {x: 10, y: 272, anchor: 'start'},
    diameter: {x: 132, y: 272, anchor: 'start'},
    tension: {x: 244, y: 272, anchor: 'start'},
    truth: {x: 244, y: 326, anchor: 'start'},
    speed: {x: 372, y: 272, anchor: 'start'},
  },
};
