import {type Act, type LogEntry} from '../run/log';
import {startRun} from '../run/replay';
import {type Run} from '../run/run';
import {type Scenario} from '../scenario/scenario';
import {aScenario} from './a-scenario';

/** A stand with noise, actions of its own and everything the brake can have. */
export const LIVELY: Scenario = aScenario({
  name: 'lively',
  seed: 20_261_201,
  lineRoundS: 0.5,
  web: {lossTimeS: 0.004, stretchLimitPct: 0.3},
  roll: {eccentricityM: 0.0004, coulombNm: 0.4, viscousNmS: 0.005},
  span: {lengthM: 3, idlerDragN: 3, idlerMassKg: 2, rollerRunoutM: 0.0001},
  brake: {deadTimeS: 0.023, playPct: 0.5, stickPct: 0.3, breakaway: 1.2, fadePerK: 0.002},
  sensing: {noiseN: 1.5},
  controller: {standstillPct: 15, tdS: 0.02, inputFilterS: 0.03},
  actions: [
    {atS: 6, set: {setPointN: 150}},
    {atS: 9, disturb: {ovalM: 0.0002, rippleMps: 0.004, rippleHz: 4}},
  ],
});

/** What somebody did, each with the tick it was done at. */
const DONE: readonly (readonly [tick: number, act: Act])[] = [
  [400, {set: {kp: 0.12, tiS: 0.4}}],
  [400, {set: {radiusCompensation: true, radiusRefM: 0.3}}],
  [600, {set: {setPointN: 140}}],
  [655, {line: {command: 'run', speedMps: 3, rampS: 2}}],
  [900, {disturb: {spanPct: 95}}],
  [901, {set: {mode: 'manual', manualPct: 30}}],
  [950, {set: {mode: 'automatic'}}],
  [1000, {disturb: {radiusM: 0.22}}],
  [1200, {line: {command: 'stop', rampS: 2}}],
  [1250, {set: {stopHoldGain: 1.4}}],
];

export interface Lived {
  readonly run: Run;
  readonly log: readonly LogEntry[];
  readonly throughTick: number;
}

/** Lives the lively stand for 16 s, `stride` ticks a call at most. */
export function live(stride = 50): Lived {
  const run = startRun(LIVELY);
  const log: LogEntry[] = [];
  const goTo = (tick: number): void => {
    while (run.tick < tick) run.advance(Math.min(stride, tick - run.tick));
  };
  for (const [tick, act] of DONE) {
    goTo(tick);
    log.push(run.act(act));
  }
  log.push(run.note({kind: 'pause'}));
  goTo(1600);
  log.push(run.note({kind: 'end', hash: run.hash()}));
  return {run, log, throughTick: 1600};
}
