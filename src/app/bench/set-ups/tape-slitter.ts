import {type SetUp, standing} from './stand';

/** A narrow, quick stand, kept for contrast: light roll, short lags, an answer in a blink. */
export const TAPE_SLITTER: SetUp = {
  key: 'tape-slitter',
  title: 'Tape slitter',
  summary: '30 µm polypropylene, 0.15 m wide, powder brake, load cell',
  source:
    'Oriented polypropylene 30 µm: 2.5 GPa, start 50 to 130 N/m (from memory). Brake, lags, inertia and sensor: common practice, no source.',
  radii: {small: 0.06, half: 0.11, full: 0.2},
  job: {speedMps: 3, rampS: 6, stopS: 6},
  scenario: standing(
    {
      name: 'Tape slitter',
      web: {
        widthM: 0.15,
        thicknessM: 30e-6,
        modulusPa: 2.5e9,
        densityKgM3: 905,
        breakNPerM: 2000,
        lossTimeS: 0.004,
      },
      roll: {
        coreRadiusM: 0.038,
        coreInertiaKgM2: 0.004,
        woundTensionN: 8,
        coulombNm: 0.03,
        viscousNmS: 0.001,
      },
      span: {lengthM: 1, idlerDragN: 0.6, idlerMassKg: 0.6},
      brake: {
        maxTorqueNm: 6,
        residualTorqueNm: 0.05,
        lagS: 0.08,
        deadTimeS: 0.01,
        playPct: 1,
        curve: [
          [0, 0],
          [10, 0.06],
          [90, 0.93],
          [100, 1],
        ],
        capacityJPerK: 600,
        conductanceWPerK: 1,
      },
      sensing: {kind: 'loadCell', rangeN: 40, filterS: 0.04, noiseN: 0.05},
      controller: {
        kp: 0.43,
        tiS: 0.36,
        setPointN: 12,
        startRampS: 2,
        startFraction: 0.75,
        standstillPct: 0,
        stopHoldS: 7.5,
        stopHoldGain: 1.2,
        radiusCompensation: true,
        radiusRefM: 0.11,
      },
    },
    0.11,
  ),
};
