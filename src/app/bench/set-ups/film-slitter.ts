import {type SetUp, standing} from './stand';

/** A soft film: half a per cent of strain at the job’s tension, and the web itself damps what the roll does. */
export const FILM_SLITTER: SetUp = {
  key: 'film-slitter',
  title: 'Film slitter',
  summary: '50 µm polyethylene, 0.5 m wide, powder brake, load cell',
  source:
    'Low-density polyethylene: modulus 0.2 GPa, start 20 to 70 N/m (from memory). Brake, lags, inertia and sensor: common practice, no source.',
  radii: {small: 0.08, half: 0.16, full: 0.3},
  job: {speedMps: 1.5, rampS: 8, stopS: 8},
  scenario: standing(
    {
      name: 'Film slitter',
      web: {
        widthM: 0.5,
        thicknessM: 50e-6,
        modulusPa: 0.2e9,
        densityKgM3: 920,
        breakNPerM: 400,
        lossTimeS: 0.02,
      },
      roll: {
        coreRadiusM: 0.05,
        coreInertiaKgM2: 0.1,
        woundTensionN: 0,
        coulombNm: 0.2,
        viscousNmS: 0.01,
      },
      span: {lengthM: 1.5, idlerDragN: 1.5, idlerMassKg: 2},
      brake: {
        maxTorqueNm: 20,
        residualTorqueNm: 0.2,
        lagS: 0.25,
        deadTimeS: 0.02,
        playPct: 2,
        curve: [
          [0, 0],
          [10, 0.06],
          [90, 0.93],
          [100, 1],
        ],
        capacityJPerK: 1500,
        conductanceWPerK: 2,
      },
      sensing: {kind: 'loadCell', rangeN: 80, filterS: 0.2, noiseN: 0.1},
      controller: {
        kp: 0.31,
        tiS: 0.36,
        setPointN: 30,
        startRampS: 3,
        startFraction: 0.75,
        standstillPct: 0,
        stopHoldS: 9.5,
        stopHoldGain: 1.2,
        radiusCompensation: true,
        radiusRefM: 0.16,
      },
    },
    0.16,
  ),
};
