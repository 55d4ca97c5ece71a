import fs from 'node:fs';
import path from 'node:path';
import {type Scenario} from '#sim-core/index';

/** One document to run, and the true answer where there is one. */
export interface Case {
  readonly name: string;
  readonly document: Scenario;
  /** Tension [N] each 0.1 s from an independent solver (sim-core/reference). */
  readonly trueN?: readonly number[];
}

const REFERENCE = path.join(import.meta.dirname, '..', '..', '..', 'sim-core', 'reference');

/** The reference cases, by their letter. */
export function referenceCases(): ReadonlyMap<string, Case> {
  const files = fs.readdirSync(REFERENCE).filter((file) => file.endsWith('.json'));
  return new Map(files.map((file) => [file.charAt(0), referenceCase(file.replace('.json', ''))]));
}

function referenceCase(name: string): Case {
  const text = (ending: string): string =>
    fs.readFileSync(path.join(REFERENCE, `${name}${ending}`), 'utf8');
  return {
    name,
    document: JSON.parse(text('.json')) as Scenario,
    trueN: tensions(text('.csv')),
  };
}

/** The tension column of a result table. */
export function tensions(table: string): number[] {
  const [head = '', ...lines] = table.trim().split('\n');
  const column = head.split(',').indexOf('tension_N');
  return lines.map((line) => Number(line.split(',')[column]));
}

/** What full scale means for an error in tension [N]; a dancer's is twice its set point. */
export function rangeN({sensing, controller}: Scenario): number {
  return sensing.kind === 'loadCell' ? sensing.rangeN : 2 * controller.setPointN;
}

/** Plant REF-A of the handbook: a paper roll of 1 m. Loop, heat and noise are of this benchmark. */
const PAPER: Scenario = {
  format: 'evenspan.scenario/1',
  name: 'paper',
  durationS: 60,
  seed: 7,
  initialTensionN: 50,
  lineRoundS: 1,
  web: {
    widthM: 1,
    thicknessM: 1e-4,
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
  span: {lengthM: 2, idlerDragN: 3},
  brake: {
    maxTorqueNm: 250,
    residualTorqueNm: 1.5,
    lagS: 0.1,
    deadTimeS: 0.03,
    playPct: 0.4,
    capacityJPerK: 4000,
    conductanceWPerK: 6,
    fadePerK: 0.002,
    fadeStartC: 60,
  },
  sensing: {kind: 'loadCell', rangeN: 400, filterS: 0.05, noiseN: 0.8},
  controller: {
    kp: 0.08,
    tiS: 0.15,
    setPointN: 200,
    startRampS: 8,
    startFraction: 0.4,
    standstillPct: 20,
    stopHoldS: 5,
    stopHoldGain: 1.4,
  },
  line: [{atS: 1, command: 'run', speedMps: 2, rampS: 10}],
  actions: [],
};

/** Twenty minutes of an out-of-round roll whose brake warms up and fades. */
export const TWENTY_MINUTES: Case = {
  name: '20 min, out of round, heat and fade',
  document: {
    ...PAPER,
    durationS: 1200,
    roll: {...PAPER.roll, eccentricityM: 0.001},
    line: [
      ...PAPER.line,
      {atS: 600, command: 'run', speedMps: 2.8, rampS: 8},
      {atS: 1175, command: 'stop', rampS: 10},
    ],
    actions: [
      {atS: 200, set: {setPointN: 240}},
      {atS: 400, set: {setPointN: 180}},
      {atS: 800, set: {setPointN: 220}},
      {atS: 1000, set: {setPointN: 200}},
    ],
  },
};

/** An hour at one speed, for its rows. The roll lasts 65 minutes at 2 m/s. */
export const ONE_HOUR: Case = {
  name: 'one hour',
  document: {...PAPER, durationS: 3600},
};

/** One minute with a set point step and a speed change: a point of the map. */
export const MAP_RUN: Case = {
  name: 'map',
  document: {
    ...PAPER,
    line: [...PAPER.line, {atS: 45, command: 'run', speedMps: 2.5, rampS: 5}],
    actions: [{atS: 30, set: {setPointN: 240}}],
  },
};
