import {SCENARIO_FORMAT} from '#sim-core/index';
import {type SetUp} from './stand';

/**
 * An invented paper coater with a half roll. Data: common practice, no source. It starts at its own equilibrium:
 * the holding brake can hold the job's tension at rest (200 N × 0.25 m = 50 N·m, which 20 % of the brake gives).
 * The half roll hunts from a gain of about 2, the small one from about 0.8: half of the edge found on the one is
 * past the edge of the other.
 */
export const COATER_1: SetUp = {
  key: 'coater-1',
  title: 'Coater 1, unwind',
  summary: '100 µm paper, 1.0 m wide, air brake, load cell',
  source: 'Common practice, no source; the same stand as the exercises on paper.',
  radii: {small: 0.1, half: 0.25, full: 0.5},
  job: {speedMps: 2, rampS: 10, stopS: 8, firstStopS: 4},
  scenario: {
    format: SCENARIO_FORMAT,
    name: 'Coater 1',
    durationS: 3600,
    seed: 1,
    initialTensionN: 150,
    lineRoundS: 1,
    web: {
      widthM: 1,
      thicknessM: 100e-6,
      modulusPa: 4e9,
      densityKgM3: 800,
      breakNPerM: 1200,
      lossTimeS: 0.005,
    },
    roll: {
      coreRadiusM: 0.05,
      radiusM: 0.25,
      coreInertiaKgM2: 0.4,
      woundTensionN: 100,
      coulombNm: 0.5,
      viscousNmS: 0.05,
    },
    span: {lengthM: 2, idlerDragN: 4},
    brake: {
      maxTorqueNm: 250,
      residualTorqueNm: 1.5,
      lagS: 0.2,
      deadTimeS: 0.1,
      capacityJPerK: 5000,
      conductanceWPerK: 6.67,
    },
    sensing: {kind: 'loadCell', rangeN: 500, filterS: 0.1, noiseN: 0.5},
    controller: {
      kp: 0.3,
      tiS: 0.6,
      setPointN: 200,
      startRampS: 4,
      startFraction: 0.7,
      standstillPct: 20,
      stopHoldS: 6,
      stopHoldGain: 1,
      radiusRefM: 0.25,
    },
    line: [],
    actions: [],
  },
};
