import {type SetUp, standing} from './stand';

/** A wide, weak tissue on a dancer: long ramps, and a brake that must hardly touch. */
export const TISSUE_CONVERTER: SetUp = {
  key: 'tissue-converter',
  title: 'Tissue converter',
  summary: '130 µm tissue, 2.4 m wide, air brake, dancer',
  source:
    'Tissue 20 g/m²: 0.15 GPa, start 10 to 40 N/m (from memory). Brake, lags, inertia and sensor: common practice, no source.',
  radii: {small: 0.15, half: 0.32, full: 0.6},
  job: {speedMps: 4, rampS: 16, stopS: 16},
  scenario: standing(
    {
      name: 'Tissue converter',
      web: {
        widthM: 2.4,
        thicknessM: 130e-6,
        modulusPa: 0.15e9,
        densityKgM3: 150,
        breakNPerM: 250,
        lossTimeS: 0.03,
      },
      roll: {
        coreRadiusM: 0.06,
        coreInertiaKgM2: 1,
        woundTensionN: 30,
        coulombNm: 0.8,
        viscousNmS: 0.04,
      },
      span: {lengthM: 6, idlerDragN: 4, idlerMassKg: 10},
      brake: {
        maxTorqueNm: 110,
        residualTorqueNm: 1,
        lagS: 0.35,
        deadTimeS: 0.12,
        playPct: 1.5,
        capacityJPerK: 5000,
        conductanceWPerK: 8,
      },
      sensing: {kind: 'dancer', travelM: 0.3, massKg: 12, dampingNsPerM: 400},
      controller: {
        kp: 0.5,
        tiS: 14,
        tdS: 1.1,
        setPointN: 60,
        startRampS: 6,
        startFraction: 0.75,
        standstillPct: 0,
        stopHoldS: 17.5,
        stopHoldGain: 1.2,
        radiusCompensation: true,
        radiusRefM: 0.32,
      },
    },
    0.32,
  ),
};
