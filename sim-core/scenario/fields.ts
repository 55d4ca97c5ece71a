import {type ControllerParams} from './scenario';

/** What a key holds. `whole` is an integer, `pairs` a list of points [x, y] with x rising. */
export type FieldKind = 'number' | 'whole' | 'boolean' | 'text' | 'choice' | 'pairs';

/** Range of one number; both ends allowed. */
export interface Bounds {
  readonly lowest: number;
  readonly highest: number;
}

/** Whether a text can be stored and sent: no null character and no half of a surrogate pair. */
export function isPlainText(text: string): boolean {
  return !/\0|[\ud800-\udbff](?![\udc00-\udfff])|(?<![\ud800-\udbff])[\udc00-\udfff]/.test(text);
}

/** Points of a curve: range of each number and how many points there may be. */
export interface PairBounds {
  readonly x: Bounds;
  readonly y: Bounds;
  readonly xUnit: string;
  readonly yUnit: string;
  readonly fewest: number;
  readonly most: number;
  /** Where the first and the last point must lie; not given: anywhere in the range. */
  readonly from?: number;
  readonly to?: number;
}

/** One key of the scenario document: what may stand there. */
export interface Field {
  /** Place in the document, `web.widthM`; for an item of a list the key within the item. */
  readonly path: string;
  readonly kind: FieldKind;
  /** Unit as written beside a number; empty for none. */
  readonly unit: string;
  /** Lowest value, both ends allowed; of a text its shortest length. Null when numbers do not apply. */
  readonly lowest: number | null;
  readonly highest: number | null;
  /** Value when the key is left out; null when there is none. */
  readonly default: number | boolean | string | readonly (readonly [number, number])[] | null;
  readonly required: boolean;
  /** Whether a `set` or a `disturb` may change it while the line runs. */
  readonly live: boolean;
  /** Whether null in a `set` or `disturb` takes it off. A document leaves the key out instead. */
  readonly offByNull: boolean;
  readonly choices?: readonly (string | number)[];
  readonly pairs?: PairBounds;
  /** Only with this kind of sensing. */
  readonly onlyWith?: 'loadCell' | 'dancer';
  /** Only with these line commands. */
  readonly onlyCommand?: readonly string[];
}

type Extra = Partial<Omit<Field, 'path' | 'kind' | 'unit' | 'lowest' | 'highest'>>;

const base = {default: null, required: false, live: false, offByNull: false};
const LIVE: Extra = {live: true};
/** Optional and without a default: absent until set, taken off by null. */
const LIVE_OFF: Extra = {live: true, offByNull: true};

/** A required number. */
const need = (path: string, unit: string, lowest: number, highest: number, extra: Extra = {}) =>
  ({...base, path, kind: 'number', unit, lowest, highest, required: true, ...extra}) as const;

/** An optional number; `fallback` null means "none". */
const may = (
  path: string,
  unit: string,
  lowest: number,
  highest: number,
  fallback: number | null,
  extra: Extra = {},
) => ({...base, path, kind: 'number', unit, lowest, highest, default: fallback, ...extra}) as const;

const choice = (
  path: string,
  choices: readonly (string | number)[],
  fallback: string | number | null,
  extra: Extra = {},
) =>
  ({
    ...base,
    path,
    kind: 'choice',
    unit: '',
    lowest: null,
    highest: null,
    default: fallback,
    required: fallback === null,
    choices,
    ...extra,
  }) as const;

const yesNo = (path: string, fallback: boolean, extra: Extra = {}) =>
  ({
    ...base,
    path,
    kind: 'boolean',
    unit: '',
    lowest: null,
    highest: null,
    default: fallback,
    ...extra,
  }) as const;

const pairs = (path: string, bounds: PairBounds, extra: Extra = {}) =>
  ({
    ...base,
    path,
    kind: 'pairs',
    unit: '',
    lowest: null,
    highest: null,
    pairs: bounds,
    ...extra,
  }) as const;

const CELL: Extra = {onlyWith: 'loadCell'};
const DANCER: Extra = {onlyWith: 'dancer'};

/** Longest time that can be written [s]: a day. */
const DAY_S = 86_400;

/** Every key of the document outside its two lists, in the order of the model's table. */
export const FIELDS: readonly Field[] = [
  {...base, path: 'name', kind: 'text', unit: '', lowest: 1, highest: 200, required: true},
  need('durationS', 's', 0.01, DAY_S),
  {...base, path: 'seed', kind: 'whole', unit: '', lowest: 0, highest: 4294967295, required: true},
  need('initialTensionN', 'N', 0, 100_000),
  may('lineRoundS', 's', 0, 60, 0),
  may('plantStepS', 's', 0.00001, 0.005, 0.001),

  need('web.widthM', 'm', 0.001, 20),
  need('web.thicknessM', 'm', 1e-7, 0.05),
  need('web.modulusPa', 'Pa', 1000, 1e12),
  need('web.densityKgM3', 'kg/m³', 1, 30_000),
  need('web.breakNPerM', 'N/m', 1, 1e7),
  may('web.lossTimeS', 's', 0, 1, 0),
  may('web.stretchLimitPct', '%', 0.001, 1000, null),
  may('web.maxwellModulusPa', 'Pa', 0, 1e12, 0),
  may('web.maxwellTimeS', 's', 0.1, DAY_S, 100),

  need('roll.coreRadiusM', 'm', 0.005, 2),
  need('roll.radiusM', 'm', 0.005, 5),
  need('roll.coreInertiaKgM2', 'kg·m²', 1e-6, 100_000),
  need('roll.woundTensionN', 'N', 0, 100_000),
  may('roll.eccentricityM', 'm', 0, 0.1, 0, LIVE),
  may('roll.ovalM', 'm', 0, 0.1, 0, LIVE),
  may('roll.coulombNm', 'N·m', 0, 10_000, 0),
  may('roll.viscousNmS', 'N·m·s', 0, 10_000, 0),

  need('span.lengthM', 'm', 0.1, 100),
  may('span.idlerDragN', 'N', 0, 10_000, 0),
  may('span.idlerMassKg', 'kg', 0, 10_000, 0),
  may('span.rollerRadiusM', 'm', 0.005, 2, 0.05),
  may('span.rollerRunoutM', 'm', 0, 0.02, 0),

  need('brake.maxTorqueNm', 'N·m', 0.001, 1e6),
  may('brake.residualTorqueNm', 'N·m', 0, 1e6, 0),
  need('brake.lagS', 's', 0, 60),
  may('brake.lagUpS', 's', 0, 60, null),
  may('brake.lagDownS', 's', 0, 60, null),
  may('brake.deadTimeS', 's', 0, 10, 0),
  may('brake.playPct', '%', 0, 50, 0),
  may('brake.stickPct', '%', 0, 50, 0),
  may('brake.breakaway', '', 1, 10, 1),
  may('brake.breakawayRadps', 'rad/s', 0.001, 1000, 0.5),
  pairs(
    'brake.curve',
    {
      x: {lowest: 0, highest: 100},
      y: {lowest: 0, highest: 1},
      xUnit: '%',
      yUnit: '',
      fewest: 2,
      most: 100,
      from: 0,
      to: 100,
    },
    {
      default: [
        [0, 0],
        [100, 1],
      ],
    },
  ),
  need('brake.capacityJPerK', 'J/K', 1, 1e8),
  need('brake.conductanceWPerK', 'W/K', 0.001, 1e6),
  may('brake.ambientC', '°C', -50, 100, 25),
  may('brake.fadePerK', '1/K', 0, 0.1, 0),
  may('brake.fadeStartC', '°C', -50, 1000, 80),
  may('brake.limitC', '°C', 0, 2000, 150),

  choice('sensing.kind', ['loadCell', 'dancer'], null),
  need('sensing.rangeN', 'N', 0.1, 1e6, CELL),
  need('sensing.filterS', 's', 0, 60, CELL),
  may('sensing.noiseN', 'N', 0, 100_000, 0, CELL),
  may('sensing.zeroN', 'N', -100_000, 100_000, 0, {...CELL, live: true}),
  may('sensing.spanPct', '%', -1000, 1000, 100, {...CELL, live: true}),
  need('sensing.travelM', 'm', 0.001, 10, DANCER),
  need('sensing.massKg', 'kg', 0.01, 10_000, DANCER),
  need('sensing.dampingNsPerM', 'N·s/m', 0, 1e6, DANCER),

  may('controller.sampleS', 's', 0.001, 0.1, 0.01),
  need('controller.kp', '%/%', 0, 1000, LIVE),
  need('controller.tiS', 's', 0, 10_000, LIVE),
  may('controller.tdS', 's', 0, 1000, 0, LIVE),
  may('controller.derivativeN', '', 0.1, 1000, 10, LIVE),
  may('controller.setPointWeight', '', 0, 1, 1, LIVE),
  may('controller.outMinPct', '%', 0, 100, 0, LIVE),
  may('controller.outMaxPct', '%', 0, 100, 100, LIVE),
  need('controller.setPointN', 'N', 0, 100_000, LIVE),
  choice('controller.mode', ['automatic', 'manual'], 'automatic', LIVE),
  may('controller.manualPct', '%', 0, 100, 0, LIVE),
  need('controller.startRampS', 's', 0, 3600, LIVE),
  need('controller.startFraction', '', 0, 1, LIVE),
  need('controller.standstillPct', '%', 0, 100, LIVE),
  need('controller.stopHoldS', 's', 0, 3600, LIVE),
  need('controller.stopHoldGain', '', 0, 100, LIVE),
  yesNo('controller.radiusCompensation', false, LIVE),
  may('controller.radiusRefM', 'm', 0.005, 10, null, LIVE_OFF),
  may('controller.inertiaAssistPct', '%', 0, 1000, 0, LIVE),
  may('controller.setPointRateNps', 'N/s', 0, 1e6, 0, LIVE),
  may('controller.startOutputPct', '%', 0, 100, null, LIVE_OFF),
  may('controller.closeAboveN', 'N', 0, 100_000, 0, LIVE),
  may('controller.startHoldS', 's', 0, 3600, 0, LIVE),
  may('controller.fastStopGain', '', 0, 100, null, LIVE_OFF),
  may('controller.fastStopHoldS', 's', 0, 3600, null, LIVE_OFF),
  pairs(
    'controller.gainByRadius',
    {
      x: {lowest: 0.001, highest: 10},
      y: {lowest: 0, highest: 100},
      xUnit: 'm',
      yUnit: '',
      fewest: 1,
      most: 50,
    },
    LIVE_OFF,
  ),
  choice('controller.radiusSource', ['true', 'counted', 'ratio'], 'true', LIVE),
  may('controller.radiusEnteredM', 'm', 0.005, 10, null, LIVE_OFF),
  may('controller.caliperEnteredM', 'm', 0, 0.05, 0, LIVE),
  may('controller.zeroAdjustN', 'N', -100_000, 100_000, 0, LIVE),
  may('controller.spanAdjustPct', '%', -10_000, 10_000, 100, LIVE),
  choice('controller.inputSign', [1, -1], 1, LIVE),
  may('controller.inputFilterS', 's', 0, 60, 0, LIVE),
  choice('controller.antiWindup', ['conditional', 'backCalculation', 'none'], 'conditional', LIVE),
  may('controller.trackingS', 's', 0.001, 10_000, null, LIVE_OFF),
  yesNo('controller.bumpless', true, LIVE),
  may('controller.outRatePctPerS', '%/s', 0, 100_000, 0, LIVE),
  may('controller.outStepPct', '%', 0, 20, 0, LIVE),
];

/** Keys of one line command. */
export const LINE_FIELDS: readonly Field[] = [
  choice('command', ['run', 'stop', 'fastStop'], null, LIVE),
  need('speedMps', 'm/s', 0, 50, {live: true, onlyCommand: ['run']}),
  need('rampS', 's', 0, 3600, LIVE),
];

/** Time of a line command or an action in a document [s]. */
export const AT_FIELD: Field = need('atS', 's', 0, DAY_S);

/** Most entries of the lists `line` and `actions`. */
export const MOST_ENTRIES = 20_000;

/** Keys of one `disturb`; at least one of them. */
export const DISTURB_FIELDS: readonly Field[] = [
  may('modulusPa', 'Pa', 1000, 1e12, null, LIVE),
  may('eccentricityM', 'm', 0, 0.1, null, LIVE),
  may('ovalM', 'm', 0, 0.1, null, LIVE),
  may('zeroN', 'N', -100_000, 100_000, null, {...CELL, live: true}),
  may('spanPct', '%', -1000, 1000, null, {...CELL, live: true}),
  may('supply', '', 0, 1, null, LIVE),
  may('knownLoadN', 'N', 0, 1e6, null, {...CELL, live: true, offByNull: true}),
  may('rippleMps', 'm/s', 0, 10, null, LIVE),
  may('rippleHz', 'Hz', 0, 500, null, LIVE),
  may('radiusM', 'm', 0.005, 5, null, LIVE),
];

/** The controller's fields that a `set` may change, by their bare key. */
export const SET_FIELDS: readonly Field[] = FIELDS.filter(
  (field) => field.live && field.path.startsWith('controller.'),
).map((field) => ({...field, path: field.path.slice('controller.'.length)}));

/** Keys of the controller in the table's order. */
export const CONTROLLER_KEYS = FIELDS.filter(({path}) => path.startsWith('controller.')).map(
  ({path}) => path.slice('controller.'.length) as keyof ControllerParams,
);
