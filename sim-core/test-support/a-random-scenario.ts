import {type Scenario} from '../scenario/scenario';
import {type Parts} from './a-scenario';
import {Draws} from './draws';
import {mixed, refA, refB} from './ref-a';

/** Length of the programmes drawn [s]. */
export const DRAWN_S = 20;

/** What a drawn document may have. */
export interface Kinds {
  /** Dancers among the sensing. */
  readonly dancers?: boolean;
  /** Idlers, out-of-round rolls, run-out: what makes tension differ along the web or the radius along a turn. */
  readonly uneven?: boolean;
  /** What the brake does not do when told: play, stick, grip at rest, fade. */
  readonly moody?: boolean;
}

/**
 * A sensible document drawn from a seed: a paper or film stand of the size of REF-A or REF-B that starts, changes its
 * speed and set point, stops more or less fast and starts again. Good and bad settings alike: it may go slack, hunt
 * and hit its limits, but not break its web.
 */
export function aRandomScenario(
  seed: number,
  {dancers = true, uneven = true, moody = true}: Kinds = {},
  parts: Parts = {},
): Scenario {
  const draws = new Draws(seed);
  const isPaper = draws.chance(0.5);
  const make = isPaper ? refA : refB;
  const base = make();
  const setPointN = isPaper ? draws.between(100, 300) : draws.between(20, 40);
  const radiusM = draws.between(0.08, base.roll.radiusM);
  const {maxTorqueNm} = base.brake;
  const holdingPct = Math.min(80, (100 * setPointN * radiusM) / maxTorqueNm);
  const drawn: Parts = {
    seed,
    initialTensionN: setPointN * draws.between(0.3, 1),
    lineRoundS: draws.chance(0.5) ? draws.between(0.2, 1) : 0,
    web: {...base.web, lossTimeS: draws.chance(0.2) ? 0 : draws.between(0.002, 0.01)},
    roll: {
      ...base.roll,
      radiusM,
      woundTensionN: setPointN * draws.between(0, 1),
      coulombNm: base.roll.coulombNm! * draws.between(0, 2),
      eccentricityM: uneven && draws.chance(0.5) ? draws.between(0, 5e-4) : 0,
    },
    span: {
      lengthM: draws.between(1.5, 4),
      idlerDragN: uneven && draws.chance(0.5) ? draws.between(0, 0.1) * setPointN : 0,
      idlerMassKg: uneven && draws.chance(0.5) ? draws.between(0, 5) : 0,
      rollerRunoutM: uneven && draws.chance(0.3) ? draws.between(0, 5e-5) : 0,
    },
    brake: {
      ...base.brake,
      lagS: draws.between(0.05, 0.3),
      deadTimeS: draws.whole(0, 60) / 1000,
      capacityJPerK: draws.between(200, 5000),
      ...(moody ? moods(draws) : {}),
    },
    sensing: base.sensing,
    controller: controllerOf(draws, setPointN, holdingPct),
    line: lineOf(draws, isPaper ? 4 : 2),
    actions: [
      {atS: draws.whole(60, 90) / 10, set: {setPointN: setPointN * draws.between(0.7, 1.3)}},
    ],
  };
  const scenario = make(mixed(drawn, parts));
  if (!dancers || isPaper || !draws.chance(0.5)) return scenario; // paper is too stiff for a dancer
  const sensing = {
    kind: 'dancer',
    travelM: draws.between(0.15, 0.3),
    massKg: draws.between(2, 8),
    dampingNsPerM: draws.between(150, 500),
  } as const;
  const controller = {...scenario.controller, kp: 0.6, tiS: 8, tdS: 0.5};
  return {...scenario, sensing, controller};
}

function moods(draws: Draws): Partial<Scenario['brake']> {
  return {
    playPct: draws.chance(0.5) ? draws.between(0, 2) : 0,
    stickPct: draws.chance(0.3) ? draws.between(0, 1) : 0,
    breakaway: draws.chance(0.5) ? draws.between(1, 1.3) : 1,
    fadePerK: draws.chance(0.3) ? 0.003 : 0,
    fadeStartC: 40,
  };
}

function controllerOf(draws: Draws, setPointN: number, holdingPct: number) {
  return {
    kp: draws.between(0.02, 0.15),
    tiS: draws.between(0.2, 2),
    tdS: draws.chance(0.3) ? 0.03 : 0,
    setPointN,
    startRampS: draws.between(0, 2),
    startFraction: draws.between(0.5, 1),
    standstillPct: holdingPct * draws.between(0.8, 1.5),
    stopHoldS: draws.between(0, 4),
    stopHoldGain: draws.between(0.5, 2),
    radiusCompensation: draws.chance(0.5),
    radiusRefM: 0.2,
  };
}

function lineOf(draws: Draws, mostMps: number): Scenario['line'] {
  const speed = (): number => mostMps * draws.between(0.2, 1);
  const ramp = (least: number, most: number): number => draws.whole(10 * least, 10 * most) / 10;
  return [
    {atS: 0.5, command: 'run', speedMps: speed(), rampS: ramp(1, 5)},
    {atS: 7, command: 'run', speedMps: speed(), rampS: ramp(0.5, 3)},
    {atS: 11, command: draws.chance(0.5) ? 'stop' : 'fastStop', rampS: ramp(0.5, 4)},
    {atS: 17, command: 'run', speedMps: speed(), rampS: ramp(1, 3)},
  ];
}
