import {type SetUp, standing} from './stand';

/** Soft foil: stiff and without damping of its own, and it tears at six times the job’s tension. */
export const FOIL_COATER: SetUp = {
  key: 'foil-coater',
  title: 'Foil coater',
  summary: '9 µm aluminium foil, 0.8 m wide, powder brake, load cell',
  source:
    'Soft foil 9 µm: 69 GPa, strength 50 N/mm², start 45 to 100 N/m (from memory). Brake, lags, inertia and sensor: common practice, no source.',
  radii: {small: 0.1, half: 0.16, full: 0.25},
  job: {speedMps: 2, rampS: 12, stopS: 10},
  scenario: standing(
    {
      name: 'Foil coater',
      web: {
        widthM: 0.8,
        thicknessM: 9e-6,
        modulusPa: 69e9,
        densityKgM3: 2700,
        breakNPerM: 450,
        lossTimeS: 0.0005,
      },
      roll: {
        coreRadiusM: 0.0762,
        coreInertiaKgM2: 0.3,
        woundTensionN: 40,
        coulombNm: 0.3,
        viscousNmS: 0.02,
      },
      span: {lengthM: 2, idlerDragN: 1.5, idlerMassKg: 3},
      brake: {
        maxTorqueNm: 40,
        residualTorqueNm: 0.3,
        lagS: 0.25,
        deadTimeS: 0.02,
        playPct: 2,
        curve: [
          [0, 0],
          [10, 0.06],
          [90, 0.93],
          [100, 1],
        ],
        capacityJPerK: 3000,
        conductanceWPerK: 5,
      },
      sensing: {kind: 'loadCell', rangeN: 150, filterS: 0.15, noiseN: 0.2},
      controller: {
        kp: 0.37,
        tiS: 0.36,
        setPointN: 56,
        startRampS: 5,
        startFraction: 0.75,
        standstillPct: 0,
        stopHoldS: 11.5,
        stopHoldGain: 1.2,
        radiusCompensation: true,
        radiusRefM: 0.16,
      },
    },
    0.16,
  ),
};
