import {type Scenario} from '../scenario/scenario';
import {aDancerScenario, aScenario} from '../test-support/a-scenario';
import {record} from '../test-support/record';
import {startRun} from './replay';

const THICKNESS_M = 5e-5;
const CORE_M = 0.0762;

// Closed forms and laws of the equations in PHYSICS.md, worked out by hand.
describe('laws of the plant', () => {
  it('hold tension × radius equal to the brake torque in steady running', () => {
    const {at} = record(aScenario({controller: {mode: 'manual', manualPct: 40}}), 40);

    // a straight curve without residual: 36 N·m; the roll slows down its own inertia hardly at all
    expect(at(40, 'torqueNm')).toBeCloseTo(36, 9);
    expect(at(40, 'tensionN') * at(40, 'radiusM')).toBeCloseTo(36, 1);
  });

  it('let no web get lost: what leaves the roll is in the span or beyond the nip', () => {
    const scenario = aScenario({web: {lossTimeS: 0}, line: [run(0.5, 2, 5), stop(20, 3)]});
    const {block, run: after} = record(scenario, 30);
    // relaxed length: roll from its radius, span from strain and slack, nip by summing v/(1 + strain)
    const stiffness = 3.5e9 * 0.6 * THICKNESS_M;
    const onRoll = (row: number): number =>
      (Math.PI * (square(block.at(row, 'radiusM')) - square(CORE_M))) / THICKNESS_M;
    const inSpan = (row: number): number => {
      const tension = block.at(row, 'tensionN');
      return tension > 0 ? 3 / (1 + tension / stiffness) : 3 + block.at(row, 'slackM');
    };
    let throughNip = 0;
    for (let row = 0; row + 1 < block.count; row++)
      throughNip += 0.005 * (flow(row) + flow(row + 1));
    function flow(row: number): number {
      return block.at(row, 'lineMps') / (1 + block.at(row, 'tensionN') / stiffness);
    }
    const last = block.count - 1;

    expect(after.outcome.kind).toBe('running');
    expect(throughNip).toBeGreaterThan(30);
    // tolerance: the sum over 10 ms rows, not the engine
    expect(onRoll(0) + inSpan(0) - (onRoll(last) + inSpan(last))).toBeCloseTo(throughNip, 4);
  });

  it('let the brake hold a roll at rest up to its torque', () => {
    const still = record(aScenario({line: [], controller: {standstillPct: 40}}), 3);
    // 100 N × 0.3 m = 30 N·m against 36
    expect(still.at(3, 'rollRadps')).toBe(0);
    expect(still.at(3, 'tensionN')).toBeCloseTo(100, 9);

    const creeping = record(aScenario({line: [], controller: {standstillPct: 30}}), 3);
    // 27 N·m hold 90 N
    expect(creeping.at(3, 'rollRadps')).toBe(0);
    expect(creeping.at(3, 'tensionN')).toBeLessThan(90);
  });

  it('warm the brake to where cooling takes what braking gives', () => {
    const scenario = aScenario({
      brake: {capacityJPerK: 50, conductanceWPerK: 20},
      controller: {mode: 'manual', manualPct: 40},
    });
    const {at} = record(scenario, 40);

    const power = 36 * at(40, 'rollRadps');
    expect(at(40, 'brakeC')).toBeCloseTo(25 + power / 20, 1);
  });

  it('slow a free roll down by its friction alone', () => {
    // web slack, no brake: J·dω/dt = −τ_c
    const scenario = aScenario({
      initialTensionN: 0,
      roll: {coulombNm: 2},
      controller: {mode: 'manual', manualPct: 0},
      line: [run(0, 2, 1), stop(8, 0)],
    });
    const {at} = record(scenario, 12);
    const inertia =
      0.08 + 0.5 * Math.PI * 1390 * 0.6 * (fourth(at(10, 'radiusM')) - fourth(CORE_M));

    expect(at(10, 'tensionN')).toBe(0);
    expect((at(9.5, 'rollRadps') - at(10.5, 'rollRadps')) * inertia).toBeCloseTo(2, 2);
  });

  // handbook D.5: one idler, J 0.012 kg·m² at r 0.04 m, weighs 7.5 kg at its surface; at 0.5 m/s² it takes 3.75 N
  it('let idlers with mass take their share of the pull while the line speeds up', () => {
    const ramp = (idlerMassKg: number) =>
      record(
        aScenario({
          lineRoundS: 0.5,
          span: {idlerMassKg},
          controller: {mode: 'manual', manualPct: 40},
          line: [run(0.5, 4, 8)],
        }),
        12,
      );
    const light = ramp(0);
    const heavy = ramp(7.5);

    expect(heavy.at(6, 'tensionN') - light.at(6, 'tensionN')).toBeCloseTo(3.75, 2);
    expect(heavy.at(12, 'tensionN') - light.at(12, 'tensionN')).toBeCloseTo(0, 1);
  });

  it('break no faster loop than the step allows: half the step changes next to nothing', () => {
    const coarse = record(aScenario(), 12).column('tensionN');
    const fine = record(aScenario({plantStepS: 0.0005}), 12).column('tensionN');
    const worst = Math.max(...coarse.map((tension, row) => Math.abs(tension - fine[row]!)));

    expect(worst).toBeLessThan(1e-3);
  });

  it('keep a dancer within its travel and its tension near the loading', () => {
    const {column, at} = record(aDancerScenario({line: [run(0.5, 3, 4), stop(20, 1)]}), 30);
    const places = column('dancerM');

    expect(Math.min(...places)).toBeGreaterThanOrEqual(0);
    expect(Math.max(...places)).toBeLessThanOrEqual(0.2);
    expect(at(18, 'tensionN')).toBeCloseTo(100, 0);
  });

  it('step a stiff plant in parts and keep it finite', () => {
    // with 1 ms steps of a plain Runge–Kutta this foil blows up
    const stiff = aScenario({
      web: {thicknessM: 2e-4, modulusPa: 7e10, lossTimeS: 0.02},
      roll: {coreInertiaKgM2: 0.2},
    });
    const recorded = record(stiff, 5);

    expect(recorded.run.outcome.kind).toBe('running');
    expect(recorded.column('tensionN').every((tension) => tension < 400)).toBeTrue();
  });
});

describe('disturbances', () => {
  const running = {controller: {mode: 'manual', manualPct: 40}} as const;

  it('keep the surface speed in a flying roll change', () => {
    const sim = startRun(aScenario(running));
    sim.advance(2000);
    const before = sim.view();
    sim.act({disturb: {radiusM: 0.2}});
    sim.advance(1);
    const after = sim.view();

    expect(after.rollRadps * after.radiusM).toBeCloseTo(before.rollRadps * before.radiusM, 1);
    expect(after.radiusM).toBeCloseTo(0.2, 4);
  });

  it('lay the web at its initial tension in a roll change at rest', () => {
    const sim = startRun(aScenario({line: []}));
    sim.advance(100);
    sim.act({disturb: {radiusM: 0.25}});
    sim.advance(1);

    expect(sim.view().rollRadps).toBe(0);
    expect(sim.view().tensionN).toBeCloseTo(100, 9);
  });

  it('scale the tension with the modulus at kept strain', () => {
    const sim = startRun(aScenario({line: [], controller: {standstillPct: 100}}));
    sim.advance(10);
    sim.act({disturb: {modulusPa: 7e9}});
    sim.advance(1);

    expect(sim.view().tensionN).toBeCloseTo(200, 6);
  });

  it('show a known load, zero and span in the signal alone', () => {
    const sim = startRun(aScenario({line: [], sensing: {filterS: 0}}));
    sim.advance(5);
    sim.act({disturb: {knownLoadN: 80, zeroN: 5, spanPct: 50}});
    sim.advance(1);
    expect(sim.view().sampleN).toBeCloseTo(45, 9);
    expect(sim.view().tensionN).toBeCloseTo(100, 9);

    sim.act({disturb: {knownLoadN: null}});
    sim.advance(1);
    expect(sim.view().sampleN).toBeCloseTo(55, 9);
  });

  it('lose the brake with its supply', () => {
    const sim = startRun(aScenario(running));
    sim.advance(2000);
    sim.act({disturb: {supply: 0}});
    sim.advance(300);

    expect(sim.view().torqueNm).toBeLessThan(0.01);
    expect(sim.view().outputPct).toBe(40);
  });

  it('ripple the tension but not the speed shown', () => {
    const sim = startRun(aScenario(running));
    sim.advance(2000);
    const calm = sim.view().tensionN;
    sim.act({disturb: {rippleMps: 0.01, rippleHz: 3}});
    let most = 0;
    for (let i = 0; i < 100; i++) {
      sim.advance(1);
      most = Math.max(most, Math.abs(sim.view().tensionN - calm));
    }

    expect(most).toBeGreaterThan(5);
    expect(sim.view().lineMps).toBe(2);
  });

  it('turn a dead and a reversed cell the way they read', () => {
    const dead = record(aScenario({line: [], sensing: {spanPct: 50}}), 2);
    const reversed = record(aScenario({line: [], sensing: {spanPct: -100}}), 2);

    expect(dead.at(2, 'measuredN')).toBeCloseTo(50, 6);
    expect(reversed.at(2, 'measuredN')).toBeCloseTo(-100, 6);
    expect(reversed.run.view().sampleN).toBe(-40); // the amplifier ends at −10 % of 400 N
  });
});

describe('events', () => {
  it('end a run whose roll is empty', () => {
    const {run: after} = record(aScenario({roll: {radiusM: 0.0765}}), 30);

    expect(after.outcome.kind).toBe('rollEmpty');
    expect(after.events.at(-1)!.kind).toBe('rollEmpty');
    expect(after.advance(10)).toBe(0);
    expect(() => after.act({set: {kp: 1}})).toThrowError(/run has ended/);
  });

  it('tell of slack, of an output at its limit and of a hot brake', () => {
    const scenario: Scenario = aScenario({
      brake: {limitC: 30, capacityJPerK: 100},
      controller: {outMaxPct: 30, setPointN: 200},
      line: [run(0.5, 3, 3), stop(15, 0.5)],
    });
    const kinds = record(scenario, 20).run.events.map(({kind}) => kind);

    expect(kinds).toContain('outputLimitBegan');
    expect(kinds).toContain('outputLimitEnded');
    expect(kinds).toContain('brakeHot');
    expect(kinds).toContain('slackBegan');
  });

  it('tell of a web stretched beyond its limit and of a dancer at a stop', () => {
    const stretched = record(aScenario({web: {stretchLimitPct: 0.05}, line: []}), 1);
    const stopped = record(
      aDancerScenario({controller: {standstillPct: 0}, line: [run(0.5, 3, 0.5)]}),
      5,
    );

    expect(stretched.run.events.map(({kind}) => kind)).toContain('stretched');
    expect(stopped.run.events.map(({kind}) => kind)).toContain('dancerStop');
  });
});

function run(atS: number, speedMps: number, rampS: number) {
  return {atS, command: 'run', speedMps, rampS} as const;
}

function stop(atS: number, rampS: number) {
  return {atS, command: 'stop', rampS} as const;
}

function square(x: number): number {
  return x * x;
}

function fourth(x: number): number {
  return square(square(x));
}
