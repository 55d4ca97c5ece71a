import fs from 'node:fs';
import path from 'node:path';
import {type Scenario} from '#sim-core/index';

/** A document to be timed. */
export interface Case {
  readonly name: string;
  readonly document: Scenario;
}

/** A reference case with its answers: rows of time [s] and tension [N], and the range they are judged by [N]. */
export interface Answered extends Case {
  readonly rows: readonly (readonly [number, number])[];
  readonly rangeN: number;
}

const FOLDER = path.join(import.meta.dirname, '../../../sim-core/reference');

/** Every reference case of sim-core/reference. */
export function answeredCases(): Answered[] {
  return fs
    .readdirSync(FOLDER)
    .filter((file) => file.endsWith('.json'))
    .sort()
    .map((file) => {
      const document = read(file);
      const {sensing, controller} = document;
      const [, ...lines] = fs
        .readFileSync(path.join(FOLDER, file.replace('.json', '.csv')), 'utf8')
        .trim()
        .split('\n');
      const rows = lines.map((line) => line.split(',').map(Number) as unknown as [number, number]);
      const rangeN = sensing.kind === 'loadCell' ? sensing.rangeN : 2 * controller.setPointN;
      return {name: file.replace('.json', ''), document, rows, rangeN};
    });
}

/** What is timed warm. */
export function timedCases(): Case[] {
  return [
    {name: 'load cell, quiet line (a)', document: read('a-smooth-running.json')},
    {name: 'out-of-round roll (c)', document: read('c-out-of-round.json')},
    {name: 'dancer (d)', document: read('d-dancer-speed-change.json')},
    {name: 'near the core, hot (e)', document: read('e-near-core-hot.json')},
    {name: '20 min: uneven roll, noise, heat, fade', document: longRun()},
  ];
}

/** Twenty minutes on a paper stand (REF-A of the handbook) with an uneven roll, noise and a brake that fades. */
export function longRun(): Scenario {
  return {
    format: 'evenspan.scenario/1',
    name: 'long run',
    durationS: 1200,
    seed: 7,
    initialTensionN: 150,
    lineRoundS: 0.6,
    web: {
      widthM: 1,
      thicknessM: 1e-4,
      modulusPa: 4e9,
      densityKgM3: 800,
      breakNPerM: 3000,
      lossTimeS: 0.005,
    },
    roll: {
      coreRadiusM: 0.05,
      radiusM: 0.5,
      coreInertiaKgM2: 0.4,
      woundTensionN: 100,
      eccentricityM: 0.001,
      coulombNm: 0.5,
      viscousNmS: 0.05,
    },
    span: {lengthM: 2, idlerDragN: 4},
    brake: {
      maxTorqueNm: 250,
      residualTorqueNm: 1.5,
      lagS: 0.1,
      deadTimeS: 0.03,
      playPct: 0.5,
      capacityJPerK: 5000,
      conductanceWPerK: 6.67,
      fadePerK: 0.002,
      fadeStartC: 60,
    },
    sensing: {kind: 'loadCell', rangeN: 500, filterS: 0.05, noiseN: 0.5},
    controller: {
      kp: 0.15,
      tiS: 0.4,
      setPointN: 200,
      startRampS: 4,
      startFraction: 0.7,
      standstillPct: 40,
      stopHoldS: 5,
      stopHoldGain: 1.3,
      radiusCompensation: true,
      radiusRefM: 0.5,
    },
    line: [
      {atS: 1, command: 'run', speedMps: 2, rampS: 10},
      {atS: 600, command: 'run', speedMps: 3, rampS: 6},
    ],
    actions: [
      {atS: 300, set: {setPointN: 220}},
      {atS: 900, set: {setPointN: 180}},
    ],
  };
}

/** One point of a map: gain and integral time of a 60 s run with a set point step. */
export function mapPoint(kp: number, tiS: number): Scenario {
  const document = read('a-smooth-running.json');
  return {
    ...document,
    durationS: 60,
    controller: {...document.controller, kp, tiS, startRampS: 4},
    line: [{atS: 0.5, command: 'run', speedMps: 2, rampS: 8}],
    actions: [{atS: 30, set: {setPointN: 140}}],
  };
}

function read(file: string): Scenario {
  return JSON.parse(fs.readFileSync(path.join(FOLDER, file), 'utf8')) as Scenario;
}
