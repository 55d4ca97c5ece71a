import * as a from '../reference/a-smooth-running.rows';
import * as b from '../reference/b-start-step-stop.rows';
import * as c from '../reference/c-out-of-round.rows';
import * as d from '../reference/d-dancer-speed-change.rows';
import * as e from '../reference/e-near-core-hot.rows';
import * as f from '../reference/f-web-break.rows';
import * as g from '../reference/g-rounded-ramps.rows';
import {type Scenario} from '../scenario/scenario';
import {record, type Recorded} from '../test-support/record';
import {type TraceColumn} from './trace';

interface Case {
  readonly DOCUMENT: unknown;
  readonly ROWS: string;
}

const CASES: Readonly<Record<string, Case>> = {
  'a smooth running': a,
  'b start, step, stop': b,
  'c out of round': c,
  'd dancer, speed change': d,
  'e near the core, hot': e,
  'f web break': f,
  'g rounded ramps': g,
};

/** Rows of a reference table by column name. */
function table(text: string): Readonly<Record<string, string>>[] {
  const [head, ...lines] = text.split('\n').map((line) => line.split(','));
  return lines.map((line) => Object.fromEntries(head!.map((name, place) => [name, line[place]!])));
}

function worst({ROWS}: Case, {at}: Recorded, name: string, column: TraceColumn): number {
  return Math.max(
    ...table(ROWS).map((row) => Math.abs(at(Number(row['t_s']), column) - Number(row[name]))),
  );
}

/** Source of every value: SciPy solve_ivp, DOP853, rtol 1e-10 (README.md beside the tables). */
describe('reference', () => {
  for (const [name, reference] of Object.entries(CASES)) {
    describe(name, () => {
      const scenario = reference.DOCUMENT as Scenario;
      const {sensing, controller} = scenario;
      const rangeN = sensing.kind === 'loadCell' ? sensing.rangeN : 2 * controller.setPointN;
      let recorded: Recorded;
      beforeAll(() => {
        recorded = record(scenario);
      });

      it('holds tension within 0.02 % of range at every row', () => {
        expect(worst(reference, recorded, 'tension_N', 'tensionN') / rangeN).toBeLessThan(2e-4);
      });

      it('holds output, set point, speeds, torque, heat and slack', () => {
        const gap = (column: string, ours: TraceColumn): number =>
          worst(reference, recorded, column, ours);

        expect(gap('output_pct', 'outputPct')).toBeLessThan(1e-3);
        expect(gap('setpoint_N', 'setPointN')).toBeLessThan(1e-8);
        expect(gap('line_mps', 'lineMps')).toBeLessThan(1e-8);
        expect(gap('roll_radps', 'rollRadps')).toBeLessThan(1e-4);
        expect(gap('radius_m', 'radiusM')).toBeLessThan(1e-8);
        expect(gap('torque_Nm', 'torqueNm')).toBeLessThan(1e-2);
        expect(gap('brake_C', 'brakeC')).toBeLessThan(1e-4);
        expect(gap('slack_m', 'slackM')).toBeLessThan(1e-6);
      });

      it('goes through the same phases', () => {
        const rows = table(reference.ROWS);

        expect(rows.map((row) => recorded.phaseAt(Number(row['t_s'])))).toEqual(
          rows.map((row) => row['phase']!),
        );
      });
    });
  }

  it('d holds the dancer within 0.01 % of its travel', () => {
    const recorded = record(d.DOCUMENT as Scenario);

    expect(worst(d, recorded, 'dancer_m', 'dancerM') / 0.3).toBeLessThan(1e-4);
  });

  it('f breaks within 1 ms of the true moment', () => {
    const {run, block} = record(f.DOCUMENT as Scenario);

    expect(run.outcome.kind).toBe('webBroke');
    expect(run.events.at(-1)!.atS).toBeCloseTo(4.0861, 3);
    expect(block.count).toBe(409); // the last row is the one before the event
  });
});
