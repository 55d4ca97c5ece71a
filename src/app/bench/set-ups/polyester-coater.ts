import {type SetUp, standing} from './stand';

/** Thin polyester at speed: little tension, and a full roll that throws it about. */
export const POLYESTER_COATER: SetUp = {
  key: 'polyester-coater',
  title: 'Polyester coater',
  summary: '12 µm polyester, 1.2 m wide, powder brake, load cell',
  source:
    'Oriented polyester 12 µm: 4.5 GPa, start 50 to 100 N/m (from memory). Brake, lags, inertia and sensor: common practice, no source.',
  radii: {small: 0.11, half: 0.2, full: 0.35},
  job: {speedMps: 4, rampS: 14, stopS: 12},
  scenario: standing(
    {
      name: 'Polyester coater',
      web: {
        widthM: 1.2,
        thicknessM: 12e-6,
        modulusPa: 4.5e9,
        densityKgM3: 1395,
        breakNPerM: 1400,
        lossTimeS: 0.003,
      },
      roll: {
        coreRadiusM: 0.0762,
        coreInertiaKgM2: 0.25,
        woundTensionN: 70,
        coulombNm: 0.4,
        viscousNmS: 0.02,
      },
      span: {lengthM: 4, idlerDragN: 3, idlerMassKg: 6},
      brake: {
        maxTorqueNm: 80,
        residualTorqueNm: 0.6,
        lagS: 0.3,
        deadTimeS: 0.02,
        playPct: 2,
        curve: [
          [0, 0],
          [10, 0.06],
          [90, 0.93],
          [100, 1],
        ],
        capacityJPerK: 5000,
        conductanceWPerK: 8,
      },
      sensing: {kind: 'loadCell', rangeN: 250, filterS: 0.2, noiseN: 0.3},
      controller: {
        kp: 0.36,
        tiS: 0.36,
        setPointN: 90,
        startRampS: 6,
        startFraction: 0.75,
        standstillPct: 0,
        stopHoldS: 13.5,
        stopHoldGain: 1.2,
        radiusCompensation: true,
        radiusRefM: 0.2,
      },
    },
    0.2,
  ),
};
