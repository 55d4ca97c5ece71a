import {aScenario} from '../test-support/a-scenario';
import {record} from '../test-support/record';

// Effects that a document leaves out unless it asks for them. Sources: closed forms, named beside each value.
describe('a drive that rises and falls differently', () => {
  const manual = {mode: 'manual', manualPct: 20} as const;
  const document = (brake: object) =>
    aScenario({
      line: [],
      initialTensionN: 10,
      brake,
      controller: {...manual, standstillPct: 20},
      actions: [
        {atS: 1, set: {manualPct: 60}},
        {atS: 5, set: {manualPct: 20}},
      ],
    });

  // dx/dt = (w − x)/lag: after one lag 1 − 1/e of the way; 0.9 N·m per % on a straight curve
  it('comes 63.2 % of the way up in the lag up, down in the lag down', () => {
    const {at} = record(document({lagS: 0.1, lagUpS: 0.2, lagDownS: 0.5}), 8);

    expect(at(1.2, 'torqueNm')).toBeCloseTo(0.9 * (20 + 40 * 0.6321205588285577), 9);
    expect(at(5.5, 'torqueNm')).toBeCloseTo(0.9 * (60 - 40 * 0.6321205588285577), 5);
  });

  it('has the one lag both ways when no other is given', () => {
    const one = record(document({lagS: 0.3}), 8);
    const both = record(document({lagS: 0.1, lagUpS: 0.3, lagDownS: 0.3}), 8);

    expect(both.column('torqueNm')).toEqual(one.column('torqueNm'));
  });

  it('passes at once through the way whose lag is 0', () => {
    const {at} = record(document({lagS: 0.1, lagDownS: 0}), 8);

    expect(at(5.01, 'torqueNm')).toBeCloseTo(18, 9);
  });
});

describe('a web with a Maxwell branch', () => {
  // the roll is held by a strong brake while a short pull of the line stretches the web, then nothing moves
  const pulled = (web: object) =>
    aScenario({
      initialTensionN: 100,
      web: {breakNPerM: 40_000, lossTimeS: 0, ...web},
      brake: {maxTorqueNm: 500},
      controller: {mode: 'manual', manualPct: 100, standstillPct: 100},
      line: [
        {atS: 0.5, command: 'run', speedMps: 0.004, rampS: 0},
        {atS: 0.75, command: 'stop', rampS: 0},
      ],
    });
  const maxwell = {maxwellModulusPa: 1e9, maxwellTimeS: 20};

  // dT_m/dt = E_m·A·dε/dt − T_m/τ_m (handbook A.4): at rest T falls to EA·ε as e^(−t/τ)
  it('relaxes at rest to the elastic tension with its time constant', () => {
    const elastic = record(pulled({}), 60);
    const relaxing = record(pulled(maxwell), 60);
    const above = (tS: number): number => relaxing.at(tS, 'tensionN') - elastic.at(tS, 'tensionN');

    expect(elastic.at(2, 'rollRadps')).toBe(0);
    expect(elastic.at(50, 'tensionN')).toBeCloseTo(elastic.at(1, 'tensionN'), 9);
    // 1 mm over 3 m: strain 3.33e-4, times 1e9 Pa × 3e-5 m² = 10 N more, less what the pull of 0.25 s relaxed
    expect(above(0.75)).toBeGreaterThan(9.8);
    expect(above(0.75)).toBeLessThan(10.01);
    expect(above(21) / above(1)).toBeCloseTo(1 / Math.E, 6);
    expect(above(41) / above(1)).toBeCloseTo(1 / (Math.E * Math.E), 6);
  });

  // balance of the branch over a span whose web is renewed v/L times a second, at constant strain:
  // 0 = (ε − z)/τ − (v/L)·(z − ε₁), so T_m = E_m·A·(ε − ε₁)·(v/L)/(v/L + 1/τ)
  it('pulls on in running what its new web has not relaxed yet', () => {
    const {at} = record(
      aScenario({
        web: {maxwellModulusPa: 1e9, maxwellTimeS: 3},
        roll: {woundTensionN: 0},
        controller: {mode: 'manual', manualPct: 40},
      }),
      60,
    );
    const perS = at(60, 'lineMps') / 3;
    const share = perS / (perS + 1 / 3);
    // T = EA·ε + E_m·A·ε·share and T follows from the brake: the strain must be smaller than without the branch
    const strain = at(60, 'tensionN') / (3.5e9 * 3e-5 + 1e9 * 3e-5 * share);
    const slipped = at(60, 'lineMps') - at(60, 'rollRadps') * at(60, 'radiusM');

    // mass through the span: v₁ = v/(1 + ε)
    expect(slipped / at(60, 'lineMps')).toBeCloseTo(strain / (1 + strain), 6);
  });

  it('changes nothing when its modulus is 0', () => {
    const plain = record(aScenario(), 10);
    const zero = record(aScenario({web: {maxwellModulusPa: 0, maxwellTimeS: 5}}), 10);

    expect(zero.column('tensionN')).toEqual(plain.column('tensionN'));
  });
});

describe('an output with a resolution', () => {
  it('reaches the brake in whole steps, each the nearest', () => {
    const {column} = record(aScenario({controller: {outStepPct: 0.5}}), 12);
    const steps = column('outputPct').map((output) => output / 0.5);

    expect(new Set(steps).size).toBeGreaterThan(10);
    expect(steps.every((step) => step === Math.round(step))).toBeTrue();
  });

  // between two steps a loop with integral action hunts (handbook C.7)
  it('hunts about a set point that lies between two steps', () => {
    const hunt = (outStepPct: number): number => {
      const {column} = record(aScenario({controller: {outStepPct}}), 40);
      const late = column('tensionN').slice(3000);
      return Math.max(...late) - Math.min(...late);
    };

    expect(hunt(0)).toBeLessThan(1);
    expect(hunt(4)).toBeGreaterThan(2);
  });
});

describe('an output with a greatest rate', () => {
  const stepped = (controller: object) =>
    record(
      aScenario({
        controller: {kp: 0.2, ...controller},
        actions: [{atS: 10, set: {setPointN: 250}}],
      }),
      20,
    );
  const fastest = (outputs: readonly number[]): number =>
    Math.max(...outputs.slice(1).map((output, place) => Math.abs(output - outputs[place]!)));

  it('moves no faster while the loop is closed', () => {
    const free = stepped({}).column('outputPct').slice(600);
    const slowed = stepped({outRatePctPerS: 20}).column('outputPct').slice(600);

    expect(fastest(free)).toBeGreaterThan(5);
    expect(fastest(slowed)).toBeCloseTo(0.2, 9);
  });

  it('does not wind up meanwhile', () => {
    const limits = {outRatePctPerS: 10, tiS: 0.2, kp: 0.3};
    const peak = (antiWindup: 'conditional' | 'none'): number =>
      Math.max(...stepped({...limits, antiWindup}).column('tensionN'));

    expect(peak('conditional')).toBeLessThan(peak('none') - 5);
  });

  it('lets a stop-hold and manual act at once', () => {
    const {column} = record(
      aScenario({
        controller: {outRatePctPerS: 5, stopHoldGain: 2},
        line: [
          {atS: 0.5, command: 'run', speedMps: 2, rampS: 5},
          {atS: 14, command: 'stop', rampS: 3},
        ],
      }),
      16,
    );

    expect(fastest(column('outputPct').slice(1390, 1410))).toBeGreaterThan(20);
  });
});
