import {FIELDS, type Field, type Scenario, scenarioFaults} from '#sim-core/index';
import {type Draws} from './draws';
import {at, copyOf, put} from './paths';
import {sensibleValue} from './values';

/** A thin film on a load cell with noise. */
const FILM: Scenario = {
  format: 'evenspan.scenario/1',
  name: 'film',
  durationS: 60,
  seed: 7,
  initialTensionN: 60,
  lineRoundS: 0.5,
  web: {widthM: 0.6, thicknessM: 5e-5, modulusPa: 3.5e9, densityKgM3: 1390, breakNPerM: 8000},
  roll: {coreRadiusM: 0.0762, radiusM: 0.3, coreInertiaKgM2: 0.08, woundTensionN: 100},
  span: {lengthM: 3, idlerDragN: 3, idlerMassKg: 1},
  brake: {maxTorqueNm: 90, lagS: 0.1, deadTimeS: 0.02, capacityJPerK: 4000, conductanceWPerK: 9},
  sensing: {kind: 'loadCell', rangeN: 400, filterS: 0.05, noiseN: 1},
  controller: {
    kp: 0.1,
    tiS: 0.5,
    setPointN: 120,
    startRampS: 2,
    startFraction: 0.5,
    standstillPct: 15,
    stopHoldS: 3,
    stopHoldGain: 1.2,
  },
  line: [{atS: 0.2, command: 'run', speedMps: 2, rampS: 4}],
  actions: [],
};

/** Paper on a pneumatic brake that plays and sticks, heavy and slow, sampled each 20 ms. */
const PAPER: Scenario = {
  ...FILM,
  name: 'paper',
  web: {
    ...FILM.web,
    widthM: 1.2,
    thicknessM: 1e-4,
    modulusPa: 4e9,
    densityKgM3: 800,
    lossTimeS: 0.002,
  },
  roll: {...FILM.roll, radiusM: 0.5, coreInertiaKgM2: 1, coulombNm: 2, eccentricityM: 5e-4},
  span: {lengthM: 6, idlerDragN: 8, idlerMassKg: 12},
  brake: {
    maxTorqueNm: 400,
    residualTorqueNm: 4,
    lagS: 0.25,
    deadTimeS: 0.06,
    playPct: 1,
    stickPct: 0.5,
    breakaway: 1.2,
    fadePerK: 0.002,
    capacityJPerK: 9000,
    conductanceWPerK: 20,
    curve: [
      [0, 0],
      [12, 0.05],
      [80, 0.9],
      [100, 1],
    ],
  },
  sensing: {kind: 'loadCell', rangeN: 1000, filterS: 0.1, noiseN: 3},
  controller: {...FILM.controller, sampleS: 0.02, kp: 0.2, tiS: 1, setPointN: 350, tdS: 0.05},
};

/** A soft nonwoven without sensor filter, sampled each 5 ms, with a controller that counts the diameter. */
export const NONWOVEN: Scenario = {
  ...FILM,
  name: 'nonwoven',
  web: {
    ...FILM.web,
    widthM: 1,
    thicknessM: 4e-4,
    modulusPa: 3e7,
    densityKgM3: 120,
    lossTimeS: 0.01,
  },
  roll: {...FILM.roll, radiusM: 0.45, woundTensionN: 30},
  span: {lengthM: 2},
  sensing: {kind: 'loadCell', rangeN: 150, filterS: 0, noiseN: 0.5},
  controller: {
    ...FILM.controller,
    sampleS: 0.005,
    setPointN: 50,
    radiusSource: 'counted',
    radiusEnteredM: 0.45,
    caliperEnteredM: 4e-4,
    radiusCompensation: true,
    radiusRefM: 0.45,
    inputFilterS: 0.03,
  },
};

/** A narrow foil, stiff enough to divide the plant's step. */
const FOIL: Scenario = {
  ...FILM,
  name: 'foil',
  web: {
    ...FILM.web,
    widthM: 0.3,
    thicknessM: 2e-5,
    modulusPa: 6e10,
    densityKgM3: 2700,
    breakNPerM: 30_000,
    lossTimeS: 0.001,
  },
  roll: {...FILM.roll, radiusM: 0.2, coreInertiaKgM2: 0.05},
  span: {lengthM: 2, rollerRunoutM: 5e-6},
  controller: {...FILM.controller, setPointN: 80, antiWindup: 'backCalculation', trackingS: 1},
};

/** A dancer on the film stand. */
const DANCER: Scenario = {
  ...FILM,
  name: 'dancer',
  sensing: {kind: 'dancer', travelM: 0.2, massKg: 4, dampingNsPerM: 300},
  controller: {...FILM.controller, kp: 0.6, tiS: 8, tdS: 0.5, setPointN: 100, standstillPct: 30},
};

/** A heavy dancer with little damping on the paper stand, which meets its stops. */
const LOOSE_DANCER: Scenario = {
  ...PAPER,
  name: 'loose dancer',
  sensing: {kind: 'dancer', travelM: 0.4, massKg: 25, dampingNsPerM: 150},
  controller: {...PAPER.controller, kp: 0.4, tiS: 20, tdS: 0.3, setPointN: 250},
};

export const FAMILIES: readonly Scenario[] = [FILM, PAPER, NONWOVEN, FOIL, DANCER, LOOSE_DANCER];

/** Keys that say when and how finely, not what the plant is. */
const KEPT = ['name', 'durationS', 'plantStepS', 'controller.sampleS', 'sensing.kind'];

/** A stand of one of the families, each of its numbers moved a little, with optional keys here and there. */
export function randomStand(draws: Draws): Scenario {
  const family = draws.pick(FAMILIES);
  const belongs = ({path, onlyWith = family.sensing.kind}: Field): boolean =>
    onlyWith === family.sensing.kind && !KEPT.includes(path);
  const fields = FIELDS.filter(belongs);
  for (let tries = 0; tries < 50; tries++) {
    const document = copyOf(family);
    put(document, 'seed', draws.whole(0, 4294967295));
    for (const field of fields) {
      const present = at(document, field.path);
      if (field.path === 'seed' || draws.chance(present === undefined ? 0.93 : 0.6)) continue;
      put(document, field.path, sensibleValue(draws, field, present));
    }
    if (scenarioFaults(document).length === 0) return document as unknown as Scenario;
  }
  return family;
}
