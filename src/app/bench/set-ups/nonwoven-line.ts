import {type SetUp, standing} from './stand';

/** A bulky, soft nonwoven on a slow air brake: patience settles it, gain does not. */
export const NONWOVEN_LINE: SetUp = {
  key: 'nonwoven-line',
  title: 'Nonwoven line',
  summary: '160 µm spunbond, 1.6 m wide, air brake, load cell',
  source:
    'Spunbond 20 g/m²: 0.1 GPa, start 20 to 60 N/m (from memory). Brake, lags, inertia and sensor: common practice, no source.',
  radii: {small: 0.12, half: 0.3, full: 0.6},
  job: {speedMps: 2.5, rampS: 12, stopS: 12},
  scenario: standing(
    {
      name: 'Nonwoven line',
      web: {
        widthM: 1.6,
        thicknessM: 160e-6,
        modulusPa: 0.1e9,
        densityKgM3: 125,
        breakNPerM: 900,
        lossTimeS: 0.03,
      },
      roll: {
        coreRadiusM: 0.05,
        coreInertiaKgM2: 0.6,
        woundTensionN: 40,
        coulombNm: 0.6,
        viscousNmS: 0.03,
      },
      span: {lengthM: 3, idlerDragN: 4, idlerMassKg: 8},
      brake: {
        maxTorqueNm: 120,
        residualTorqueNm: 1.5,
        lagS: 0.4,
        deadTimeS: 0.15,
        playPct: 1,
        capacityJPerK: 5000,
        conductanceWPerK: 8,
      },
      sensing: {kind: 'loadCell', rangeN: 200, filterS: 0.25, noiseN: 0.3},
      controller: {
        kp: 0.22,
        tiS: 0.48,
        setPointN: 64,
        startRampS: 5,
        startFraction: 0.75,
        standstillPct: 0,
        stopHoldS: 13.5,
        stopHoldGain: 1.2,
        radiusCompensation: true,
        radiusRefM: 0.3,
      },
    },
    0.3,
  ),
};
