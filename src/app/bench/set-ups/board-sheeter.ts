import {type SetUp, standing} from './stand';

/** A heavy board stand: the roll weighs a ton and more, so that a speed change moves tension more than any gain does. */
export const BOARD_SHEETER: SetUp = {
  key: 'board-sheeter',
  title: 'Board sheeter',
  summary: '400 µm board, 1.4 m wide, air brake, load cell',
  source:
    'Board 300 g/m²: start 500 to 900 N/m (from memory). Brake, lags, inertia and sensor: common practice, no source.',
  radii: {small: 0.15, half: 0.4, full: 0.75},
  job: {speedMps: 1.5, rampS: 12, stopS: 12},
  scenario: standing(
    {
      name: 'Board sheeter',
      web: {
        widthM: 1.4,
        thicknessM: 400e-6,
        modulusPa: 4e9,
        densityKgM3: 750,
        breakNPerM: 18000,
        lossTimeS: 0.004,
      },
      roll: {
        coreRadiusM: 0.076,
        coreInertiaKgM2: 2.5,
        woundTensionN: 700,
        coulombNm: 4,
        viscousNmS: 0.2,
      },
      span: {lengthM: 5, idlerDragN: 12, idlerMassKg: 30},
      brake: {
        maxTorqueNm: 1600,
        residualTorqueNm: 10,
        lagS: 0.45,
        deadTimeS: 0.18,
        playPct: 1,
        capacityJPerK: 30000,
        conductanceWPerK: 40,
      },
      sensing: {kind: 'loadCell', rangeN: 2500, filterS: 0.2, noiseN: 2},
      controller: {
        kp: 0.32,
        tiS: 0.54,
        setPointN: 980,
        startRampS: 5,
        startFraction: 0.75,
        standstillPct: 0,
        stopHoldS: 13.5,
        stopHoldGain: 1.2,
        radiusCompensation: true,
        radiusRefM: 0.4,
      },
    },
    0.4,
  ),
};
