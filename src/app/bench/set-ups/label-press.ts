import {type SetUp, standing} from './stand';

/** A narrow press with a dancer: its loading makes the tension, the loop only keeps it off its stops. */
export const LABEL_PRESS: SetUp = {
  key: 'label-press',
  title: 'Label press',
  summary: '150 µm label stock, 0.33 m wide, air brake, dancer',
  source:
    'Label stock 150 g/m²: start 250 to 500 N/m (from memory). Brake, lags, inertia and sensor: common practice, no source.',
  radii: {small: 0.08, half: 0.16, full: 0.3},
  job: {speedMps: 1.5, rampS: 10, stopS: 10},
  scenario: standing(
    {
      name: 'Label press',
      web: {
        widthM: 0.33,
        thicknessM: 150e-6,
        modulusPa: 5e9,
        densityKgM3: 1000,
        breakNPerM: 10000,
        lossTimeS: 0.005,
      },
      roll: {
        coreRadiusM: 0.038,
        coreInertiaKgM2: 0.05,
        woundTensionN: 80,
        coulombNm: 0.4,
        viscousNmS: 0.01,
      },
      span: {lengthM: 3, idlerDragN: 3, idlerMassKg: 3},
      brake: {
        maxTorqueNm: 80,
        residualTorqueNm: 0.6,
        lagS: 0.25,
        deadTimeS: 0.08,
        playPct: 2,
        capacityJPerK: 4000,
        conductanceWPerK: 5,
      },
      sensing: {kind: 'dancer', travelM: 0.2, massKg: 4, dampingNsPerM: 300},
      controller: {
        kp: 0.1,
        tiS: 20,
        tdS: 0.9,
        setPointN: 100,
        startRampS: 4,
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
