import {type Criterion, type Scenario, SCENARIO_FORMAT} from '#sim-core/index';
import {type Exercise} from '#shared/exercises/exercise';

/** Coater 1 at full roll: invented, quick as a test stand is. Data: common practice, no source. */
const scenario: Scenario = {
  format: SCENARIO_FORMAT,
  name: 'Coater 1, full roll',
  durationS: 300,
  seed: 10,
  initialTensionN: 148,
  lineRoundS: 1,
  web: {
    widthM: 1,
    thicknessM: 100e-6,
    modulusPa: 4e9,
    densityKgM3: 800,
    breakNPerM: 4000,
    lossTimeS: 0.005,
  },
  roll: {
    coreRadiusM: 0.05,
    radiusM: 0.5,
    coreInertiaKgM2: 0.4,
    woundTensionN: 100,
    coulombNm: 0.5,
    viscousNmS: 0.05,
  },
  span: {lengthM: 2, idlerDragN: 4},
  brake: {
    maxTorqueNm: 250,
    residualTorqueNm: 1.5,
    lagS: 0.1,
    deadTimeS: 0.03,
    capacityJPerK: 5000,
    conductanceWPerK: 6.67,
  },
  sensing: {kind: 'loadCell', rangeN: 500, filterS: 0.05, noiseN: 0.5},
  controller: {
    kp: 0.2,
    tiS: 0.12,
    setPointN: 200,
    startRampS: 8,
    startFraction: 0.7,
    standstillPct: 30,
    stopHoldS: 6,
    stopHoldGain: 1,
  },
  line: [],
  actions: [],
};

/** The last stop from job speed is the one that is marked. */
const lastStop = {command: 'stop', nth: -1, fromSpeedMps: 1.95} as const;
/** Stop ramp 3 s, rounding 1 s and 3 s more: what the stop itself does to the web. */
const stopping = {kind: 'commands', from: lastStop, forS: 7, atLeastS: 7} as const;
/** Until the next command: a loop may also form late, or stay. */
const untilRestart = {kind: 'commands', from: lastStop, atLeastS: 7} as const;
/** Start ramp 7 s, rounding 1 s and 3 s more; it must at least be run up. */
const restarting = {
  kind: 'commands',
  from: lastStop,
  then: {command: 'run', withinS: [12, 20]},
  forS: 11,
  atLeastS: 8,
} as const;

const criteria: Criterion[] = [
  {kind: 'measure', measure: 'loopM', window: untilRestart, full: 0.005, zero: 0.05, weight: 30},
  {kind: 'measure', measure: 'leastN', window: stopping, full: 50, zero: 10, weight: 25},
  {kind: 'measure', measure: 'peakN', window: stopping, full: 280, zero: 335, weight: 25},
  {kind: 'measure', measure: 'peakN', window: restarting, full: 215, zero: 285, weight: 20},
  {kind: 'mustNot', measure: 'peakN', window: stopping, limit: 600},
  {kind: 'mustNot', measure: 'peakN', window: restarting, limit: 600},
];

/**
 * Exercise 10 of the library. Lesson: enough brake to keep the web taut, gone before the next start. Ramps are
 * 3 and 7 s plus 1 s of rounding: the line stops in 4 s and starts in 8. Run on the engine (boost × / boost time
 * → loop, least, peak, restart peak; restart 15 s after the stop):
 *
 *     1.0 / 6 s    128 mm    0 N   200 N   2367 N   as found; with other gains 2132 to 3985 N
 *     1.3 / 5 s    none     39     245      200     passes with 93.3
 *     1.4 / 5 s    none     58     264      200     passes with 100
 *     1.6 / 5 s    none     94     303      200     passes with 89.7
 *     1.8 / 6 s    none    128     341      200     75, but nothing for the peak
 *     1.4 / 18 s   none     58     264      291     80, but nothing for the restart
 *     1.4 / 2.5 s  58 mm     0     238     1638     the boost was gone before the line stood
 *
 * None for the peaks is 335 and 285 N where the design study had 340 and 300: the boost of 18 s gives 291 N here
 * and must not pass. One in five settings of the field passes (boost × time on a log scale, five holding brakes:
 * 140 of 720). 1.4 / 5 s passes with modulus, density or lag 10 % up or down, with 92.3 at worst (a denser roll).
 */
export const STOP_WITHOUT_A_LOOP: Exercise = {
  format: 'evenspan.exercise/1',
  number: 10,
  title: 'Stop without a loop',
  level: 3,
  topics: ['stopping', 'stop-hold', 'holding brake'],
  minutes: 10,
  brief: [
    'When the line stops, the heavy roll wants to run on. With too little brake it throws a loop of loose web, and the next start snatches it tight.',
    'Set the stop-hold so that the web stays taut through the stop, and so that the next start is calm.',
    '- Start the line: it goes to 120 m/min in 8 s.',
    '- At 120 m/min, stop it: it stops in 4 s.',
    '- Start it again 12 to 20 s after the stop command, and let it run up.',
    'You may try several stops. The last stop from 120 m/min and the start after it are marked. Then hand in.',
  ].join('\n'),
  cautions: [1, 3, 6],
  scenario,
  handOverS: 0,
  target: {tensionN: 200, toleranceN: 20},
  touch: {
    settings: [
      {key: 'stopHoldGain', lowest: 1, highest: 2.6},
      {key: 'stopHoldS', lowest: 1, highest: 20},
      {key: 'standstillPct', lowest: 20, highest: 40},
      {key: 'kp', lowest: 0.05, highest: 0.5},
    ],
    commands: [
      {command: 'run', speedMps: [2, 2], rampS: [7, 7]},
      {command: 'stop', rampS: [3, 3]},
    ],
  },
  limits: {simulatedS: 300, tries: null, entries: 2000},
  time: {pause: 'free', factors: [1, 2, 5, 20]},
  hints: [
    {
      text: 'While it slows down, the roll needs the brake of its tension plus the brake of its inertia. Try a boost between 1.2 and 1.6.',
      cost: 5,
    },
  ],
  criteria,
  passMark: 70,
};
