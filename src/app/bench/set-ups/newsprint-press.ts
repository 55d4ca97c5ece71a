import {type SetUp, standing} from './stand';

/** A quick press on newsprint with a big reel. */
export const NEWSPRINT_PRESS: SetUp = {
  key: 'newsprint-press',
  title: 'Newsprint press',
  summary: '70 µm newsprint, 1.2 m wide, air brake, load cell',
  source:
    'Newsprint 45 g/m²: 3 GPa, start 150 to 300 N/m (from memory). Brake, lags, inertia and sensor: common practice, no source.',
  radii: {small: 0.12, half: 0.28, full: 0.55},
  job: {speedMps: 4, rampS: 14, stopS: 12},
  scenario: standing(
    {
      name: 'Newsprint press',
      web: {
        widthM: 1.2,
        thicknessM: 70e-6,
        modulusPa: 3e9,
        densityKgM3: 650,
        breakNPerM: 2500,
        lossTimeS: 0.006,
      },
      roll: {
        coreRadiusM: 0.05,
        coreInertiaKgM2: 0.5,
        woundTensionN: 200,
        coulombNm: 1,
        viscousNmS: 0.05,
      },
      span: {lengthM: 3.5, idlerDragN: 5, idlerMassKg: 8},
      brake: {
        maxTorqueNm: 320,
        residualTorqueNm: 3,
        lagS: 0.3,
        deadTimeS: 0.12,
        playPct: 1,
        capacityJPerK: 9000,
        conductanceWPerK: 14,
      },
      sensing: {kind: 'loadCell', rangeN: 700, filterS: 0.15, noiseN: 0.8},
      controller: {
        kp: 0.3,
        tiS: 0.36,
        setPointN: 260,
        startRampS: 6,
        startFraction: 0.75,
        standstillPct: 0,
        stopHoldS: 13.5,
        stopHoldGain: 1.2,
        radiusCompensation: true,
        radiusRefM: 0.28,
      },
    },
    0.28,
  ),
};
