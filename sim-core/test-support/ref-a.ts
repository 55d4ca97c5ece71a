import {type Scenario} from '../scenario/scenario';
import {aScenario, type Parts} from './a-scenario';

/**
 * The two made-up plants of the project's handbook, section 0.4: A is a paper line, B a soft film. Loop and
 * programme are each spec's own; the brake is straight and its heat is no matter unless a spec says so.
 */
const REF_A: Parts = {
  durationS: 3600,
  initialTensionN: 200,
  web: {
    widthM: 1,
    thicknessM: 1e-4,
    modulusPa: 4e9,
    densityKgM3: 800,
    lossTimeS: 0.005,
    breakNPerM: 1e5,
  },
  roll: {
    coreRadiusM: 0.05,
    radiusM: 0.5,
    coreInertiaKgM2: 0.4,
    woundTensionN: 100,
    coulombNm: 0.5,
    viscousNmS: 0.05,
  },
  span: {lengthM: 2},
  brake: {
    maxTorqueNm: 250,
    residualTorqueNm: 1.5,
    lagS: 0.1,
    deadTimeS: 0.03,
    capacityJPerK: 5000,
    conductanceWPerK: 1 / 0.15,
  },
  sensing: {rangeN: 500, filterS: 0.05},
  controller: {setPointN: 200, startRampS: 0, standstillPct: 40, stopHoldS: 0},
  line: [{atS: 0, command: 'run', speedMps: 2, rampS: 10}],
};

const REF_B: Parts = {
  ...REF_A,
  initialTensionN: 30,
  web: {
    widthM: 0.5,
    thicknessM: 5e-5,
    modulusPa: 2e8,
    densityKgM3: 920,
    lossTimeS: 0.02,
    breakNPerM: 1e5,
  },
  roll: {
    coreRadiusM: 0.05,
    radiusM: 0.3,
    coreInertiaKgM2: 0.1,
    woundTensionN: 0,
    coulombNm: 0.2,
    viscousNmS: 0.01,
  },
  span: {lengthM: 1.5},
  brake: {...REF_A.brake, maxTorqueNm: 20, residualTorqueNm: 0.2},
  sensing: {rangeN: 100, filterS: 0.05},
  controller: {...REF_A.controller, setPointN: 30, standstillPct: 45},
  line: [{atS: 0, command: 'run', speedMps: 1, rampS: 10}],
};

/** What the handbook's table M takes away for its simulated checks: bearings, lags, wound-in tension. */
const PLAIN_A: Parts = {
  roll: {woundTensionN: 0, coulombNm: 0, viscousNmS: 0},
  brake: {residualTorqueNm: 0, lagS: 0, deadTimeS: 0},
  sensing: {filterS: 0},
};

export function refA(parts: Parts = {}): Scenario {
  return aScenario(mixed(REF_A, parts));
}

export function refB(parts: Parts = {}): Scenario {
  return aScenario(mixed(REF_B, parts));
}

/**
 * REF-A for the simulated checks of table M: no friction, no lag, no wound-in tension, radius held, one tick and
 * one row a millisecond. In manual at 40 %, 100 N·m, that is 200 N at the full roll.
 */
export function plainRefA(parts: Parts = {}): Scenario {
  const manual = {sampleS: 0.001, mode: 'manual', manualPct: 40} as const;
  const base = mixed(mixed(REF_A, PLAIN_A), {controller: manual});
  return withHeldRadius(aScenario(mixed(base, parts)));
}

/**
 * The same stand whose roll hardly shrinks: web a thousand times thinner and ten times wider, a hundred times
 * stiffer and ten times lighter by volume. Stiffness E·w·h and the inertia's ρ·w are what they were, and
 * dR/dt = −h·v/(2πR) is a thousandth: REF-A loses 6e-7 m of its 0.5 m in ten seconds.
 */
export function withHeldRadius(scenario: Scenario): Scenario {
  const {widthM, thicknessM, modulusPa, densityKgM3, breakNPerM} = scenario.web;
  const web = {
    ...scenario.web,
    widthM: widthM * 10,
    thicknessM: thicknessM / 1000,
    modulusPa: modulusPa * 100,
    densityKgM3: densityKgM3 / 10,
    breakNPerM: breakNPerM / 10,
  };
  return {...scenario, web};
}

/** Parts over parts, key by key within each. */
export function mixed(base: Parts, parts: Parts): Parts {
  const whole: Record<string, unknown> = {...base};
  for (const [key, value] of Object.entries<unknown>({...parts}))
    whole[key] =
      typeof value === 'object' && !Array.isArray(value)
        ? {...(whole[key] as object | undefined), ...value}
        : value;
  return whole;
}
