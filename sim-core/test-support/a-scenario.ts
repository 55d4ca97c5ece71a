import {type Scenario} from '../scenario/scenario';

/** Every part of a document, each with any of its keys. */
export type Parts = {
  readonly [K in keyof Scenario]?: Scenario[K] extends readonly unknown[]
    ? Scenario[K]
    : Scenario[K] extends object
      ? Partial<Scenario[K]>
      : Scenario[K];
};

/** A film stand with plain brake and no friction; a spec writes only what it is about. */
const PLAIN: Scenario = {
  format: 'evenspan.scenario/1',
  name: 'plain film',
  durationS: 60,
  seed: 1,
  initialTensionN: 100,
  web: {
    widthM: 0.6,
    thicknessM: 5e-5,
    modulusPa: 3.5e9,
    densityKgM3: 1390,
    breakNPerM: 4000,
    lossTimeS: 0.004,
  },
  roll: {coreRadiusM: 0.0762, radiusM: 0.3, coreInertiaKgM2: 0.08, woundTensionN: 100},
  span: {lengthM: 3},
  brake: {maxTorqueNm: 90, lagS: 0.1, capacityJPerK: 4000, conductanceWPerK: 9},
  sensing: {kind: 'loadCell', rangeN: 400, filterS: 0.05},
  controller: {
    kp: 0.1,
    tiS: 0.5,
    setPointN: 120,
    startRampS: 2,
    startFraction: 0.5,
    standstillPct: 40,
    stopHoldS: 3,
    stopHoldGain: 1.2,
  },
  line: [{atS: 0.5, command: 'run', speedMps: 2, rampS: 5}],
  actions: [],
};

export function aScenario(parts: Parts = {}): Scenario {
  const merged: Record<string, unknown> = {...PLAIN};
  for (const [key, value] of Object.entries<unknown>({...parts})) {
    merged[key] = isPart(value) ? {...(merged[key] as object), ...value} : value;
  }
  return merged as unknown as Scenario;
}

/** The same stand with a dancer. */
export function aDancerScenario(parts: Parts = {}): Scenario {
  const {sensing, ...rest} = parts;
  const dancer = {kind: 'dancer', travelM: 0.2, massKg: 4, dampingNsPerM: 300, ...sensing};
  const controller = {kp: 0.6, tiS: 8, tdS: 0.5, setPointN: 100, standstillPct: 35};
  const base = aScenario({controller, ...rest});
  return {...base, sensing: dancer as Scenario['sensing']};
}

function isPart(value: unknown): value is object {
  return typeof value === 'object' && !Array.isArray(value);
}
