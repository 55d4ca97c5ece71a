import {type Controller} from '../control/controller';
import * as control from '../control/controller-state';
import * as phases from '../control/phases';
import * as seen from '../control/seen';
import * as set from '../control/tuning';
import {DRAG_FULL_MPS} from '../plant/equations';
import * as now from '../plant/evaluation';
import {type Plant} from '../plant/plant';
import * as at from '../plant/plant-state';
import {GREATEST_SHARE, LEAST_SHARE} from '../plant/sensing';
import {type Grid} from '../plant/stand';
import {type Scenario} from '../scenario/scenario';
import {normalOf, rotated} from '../signal/random';
import {MIX_A, MIX_B} from './hash';
import {QuietCell} from './quiet-cell';
import {QuietDancer} from './quiet-dancer';
import * as quiet from './quiet-plant';
import {type QuietPlant} from './quiet-plant';
import {type Parts, writeControl, writePlant} from './readings';
import * as run from './run-state';
import {type TraceBlock} from './trace';
import {type Watch} from './watch';

/** A roll with less web than this, and twice what comes off it in a tick, may run out within one [m]. */
const NEARLY_EMPTY_M = 1;

/** What a run lends to its quiet ticks: the very arrays and objects that its careful ticks work with. */
export interface QuietParts {
  readonly scenario: Scenario;
  readonly grid: Grid;
  readonly plant: Plant;
  readonly controller: Controller;
  readonly watch: Watch;
  readonly state: Float64Array;
  /** The words of the state that go into the fingerprint. */
  readonly printed: Uint32Array;
}

/**
 * The hot loop: control ticks in which nothing bends, that is, taut web on a turning roll, the line above a crawl
 * and without a kink in its speed, a dancer between its stops. Whatever it meets that is not so it leaves to the
 * careful tick. Nothing is carried from tick to tick but the run's state, so a run may be cut anywhere.
 */
export class QuietTicks {
  /** A tick was begun, its control done, and bent before its end: the plant still has to move. */
  isOpen = false;

  private readonly p: Float64Array;
  private readonly c: Float64Array;
  private readonly random: Float64Array;
  private readonly move: QuietPlant;
  private readonly read: Parts;
  private readonly isFit: boolean;

  constructor(private readonly parts: QuietParts) {
    const {scenario, grid, plant, state} = parts;
    const {brake, sensing, web} = scenario;
    this.p = state.subarray(run.PLANT);
    this.c = state.subarray(run.CONTROLLER, run.PLANT);
    this.random = state.subarray(run.RANDOM, run.WATCH);
    this.read = {plant, plantState: this.p, controlState: this.c};
    const Kind = sensing.kind === 'dancer' ? QuietDancer : QuietCell;
    this.move = new Kind(scenario, grid, plant, this.p);
    const oneLag = (brake.lagUpS ?? brake.lagS) === (brake.lagDownS ?? brake.lagS);
    this.isFit =
      (sensing.kind === 'dancer' || sensing.filterS > 0) &&
      oneLag &&
      (web.maxwellModulusPa ?? 0) === 0 &&
      (scenario.span.rollerRunoutM ?? 0) === 0;
  }

  /** Runs at most `most` ticks, the first bent one excluded; answers how many it finished. */
  advance(most: number, block?: TraceBlock): number {
    const {p, c, random, move, parts} = this;
    this.isOpen = false;
    if (!this.isFit || p[at.RIPPLE] !== 0 || p[at.LOADED] !== 0) return 0;
    const {state, watch, plant, controller, printed} = parts;
    const {line, drive} = plant;
    const {now: n, hasDancer} = plant.equations;
    const {news, tuning} = controller;
    const {made} = move;
    const {sampleS} = parts.grid;

    const coreSquare = n[now.CORE_SQUARE]!;
    const perLength = n[now.PER_LENGTH]!;
    const spanM = n[now.SPAN_M]!;
    const travelM = n[now.TRAVEL]!;
    const noiseN = n[now.NOISE]!;
    const leastN = LEAST_SHARE * n[now.RANGE]!;
    const greatestN = GREATEST_SHARE * n[now.RANGE]!;
    const perRange = 100 / (hasDancer ? travelM : n[now.RANGE]!);
    const sense = hasDancer ? -1 : 1; // more of a dancer's travel asks for more brake
    const slowMps = DRAG_FULL_MPS;
    const lastMps = line.lastMps;

    // the controller's settings, and whether the PID below is all there is to it while the phase goes on
    const zeroAdjust = tuning[set.ZERO_ADJUST]!;
    const inputGain = tuning[set.INPUT_GAIN]!;
    const inputFilterS = tuning[set.INPUT_FILTER_S]!;
    const inputShare = inputFilterS > 0 ? sampleS / (sampleS + inputFilterS) : 1;
    const target = tuning[set.TARGET]!;
    const mostRise = tuning[set.RATE]! > 0 ? tuning[set.RATE]! * sampleS : Infinity;
    const perReference = tuning[set.PER_REFERENCE]!;
    const gain = sense * tuning[set.KP]!;
    const weight = tuning[set.WEIGHT]!;
    const tdS = tuning[set.TD]!;
    const slowS = tdS / tuning[set.DERIVATIVE_N]!;
    const outMax = tuning[set.OUT_MAX]!;
    const outMin = tuning[set.OUT_MIN]!;
    const perTick = tuning[set.TI]! > 0 ? (tuning[set.KP]! * sampleS) / tuning[set.TI]! : 0;
    const windup = tuning[set.WINDUP]!;
    const tracking = windup === set.BACK_CALCULATION ? sampleS / tuning[set.TRACKING_S]! : 0;
    const hasAssist = tuning[set.ASSIST]! > 0;
    const isPlain = controller.isPlain() && line.targetMps > 0;

    const stretchLimit = watch.stretchLimit;
    const hotC = watch.hotC;
    let isIdle = watch.isIdle();

    const mixA = MIX_A;
    const mixB = MIX_B;
    const words = printed.length;
    let printA = state[run.PRINT]! | 0;
    let printB = state[run.PRINT + 1]! | 0;
    let word0 = random[0]! | 0;
    let word1 = random[1]! | 0;
    let word2 = random[2]! | 0;
    let word3 = random[3]! | 0;
    let isSteady = false;
    let tick = state[run.TICK]! | 0;
    let done = 0;
    for (; done < most; done++) {
      const t = tick * sampleS;

      // speed of the line within the tick: c0 + c1·s + c2·s²
      let c0 = lastMps;
      let c1 = 0;
      let c2 = 0;
      if (!isSteady) isSteady = line.isSteady(t);
      if (!isSteady) {
        line.openTick(t, sampleS);
        if (line.pieces !== 1) break;
        c0 = line.c0[0]!;
        c1 = line.c1[0]!;
        c2 = line.c2[0]!;
      }
      if (!(c0 >= slowMps && c0 + sampleS * (c1 + sampleS * c2) >= slowMps)) break;
      const dancerM = p[at.DANCER]!;
      if (!(p[at.OMEGA]! > 0 && p[at.LENGTH]! < spanM + 2 * dancerM)) break;
      if (hasDancer && !(dancerM > 0 && dancerM < travelM)) break;
      const radius = Math.sqrt(coreSquare + perLength * p[at.WOUND]!);
      if (!(p[at.WOUND]! > NEARLY_EMPTY_M + 2 * p[at.OMEGA]! * radius * sampleS)) break;

      if (block !== undefined) writePlant(block, this.read, t);

      // sample: xoshiro128** as in random.ts, its words in locals
      let sample = dancerM;
      if (!hasDancer) {
        const word = rotated(Math.imul(word1, 5), 7);
        const shifted = word1 << 9;
        word2 ^= word0;
        word3 ^= word1;
        word1 ^= word2;
        word0 ^= word3;
        word2 ^= shifted;
        word3 = rotated(word3, 11);
        sample = p[at.FILTER]!;
        if (noiseN > 0) sample += noiseN * normalOf(Math.imul(word, 9) >>> 0);
        if (sample < leastN) sample = leastN;
        else if (sample > greatestN) sample = greatestN;
        state[run.SAMPLE] = sample;
      }

      // control
      if (
        isPlain &&
        c[control.PHASE] === phases.RUNNING &&
        c[control.CLOSED] === 1 &&
        !(hasAssist && c1 < 0)
      ) {
        let setPoint = target;
        const before = c[control.SET_POINT]!;
        if (target - before > mostRise) setPoint = before + mostRise;
        else if (before - target > mostRise) setPoint = before - mostRise;
        c[control.SET_POINT] = setPoint;
        let y = perRange * sample; // [% of range or travel]
        let r = 50;
        if (!hasDancer) {
          let input = (sample - zeroAdjust) * inputGain;
          if (inputShare < 1) {
            const inputBefore = c[control.INPUT]!;
            input = inputBefore + inputShare * (input - inputBefore);
          }
          c[control.INPUT] = input;
          y = perRange * input;
          r = perRange * setPoint;
        }
        const error = sense * (r - y);
        let integral = c[control.INTEGRAL]!;
        let inner = gain * (weight * r - y) + integral;
        let derivative = 0;
        if (tdS > 0) {
          const change = y - c[control.LAST_Y]!;
          derivative = (slowS * c[control.DERIVATIVE]! + change) / (slowS + sampleS);
          inner -= gain * tdS * derivative;
        }
        const wanted = perReference > 0 ? inner * radius * perReference : inner;
        let output = wanted;
        let limit = 0;
        if (wanted >= outMax) {
          output = outMax;
          limit = 1;
        } else if (wanted <= outMin) {
          output = outMin;
          limit = -1;
        }
        if (windup !== set.CONDITIONAL || !(limit * error > 0))
          integral += perTick * error + (perTick > 0 ? tracking * (output - wanted) : 0);
        c[control.RADIUS] = radius;
        c[control.INTEGRAL] = integral;
        c[control.DERIVATIVE] = derivative;
        c[control.LAST_Y] = y;
        c[control.LIMIT] = limit;
        c[control.OUTPUT] = output;
        c[control.APPLIED] = output;
      } else {
        news[seen.RAN] = 0;
        news[seen.STOPPED] = seen.NO_STOP;
        if (hasDancer) news[seen.DANCER_PCT] = perRange * sample;
        else news[seen.SAMPLE_N] = sample;
        news[seen.TICK] = tick;
        news[seen.STANDS] = line.stands(t) ? 1 : 0;
        news[seen.MEAN_RADIUS] = radius;
        news[seen.OMEGA] = p[at.OMEGA]!;
        news[seen.LINE_MPS] = c0;
        news[seen.LINE_SLOPE] = c1;
        controller.tick();
        watch.phase(tick, c[control.PHASE]!);
      }
      if (block !== undefined) writeControl(block, this.read);

      // plant
      drive.command(tick, c[control.APPLIED]!);
      made[quiet.C0] = c0;
      made[quiet.C1] = c1;
      made[quiet.C2] = c2;
      made[quiet.LOADING] = c[control.SET_POINT]!;
      if (!move.through(tick)) {
        this.isOpen = true;
        break;
      }

      const limit = c[control.LIMIT]!;
      const strain = p[at.STRAIN]!;
      const brakeC = p[at.HEAT]!;
      if (!(isIdle && limit === 0 && strain <= stretchLimit && brakeC <= hotC)) {
        const limitPct = controller.limitPct();
        watch.look(tick, {slackM: 0, strain, brakeC, isAtStop: false, limit, limitPct});
        isIdle = watch.isIdle();
      }
      for (let i = 0; i < words; i = (i + 2) | 0) {
        printA = Math.imul(printA ^ printed[i]!, mixA);
        printB = Math.imul(printB ^ printed[(i + 1) | 0]!, mixB);
        printA ^= printA >>> 15;
        printB ^= printB >>> 13;
      }
      printA = (printA + printB) | 0;
      tick = (tick + 1) | 0;
    }
    random[0] = word0 >>> 0;
    random[1] = word1 >>> 0;
    random[2] = word2 >>> 0;
    random[3] = word3 >>> 0;
    state[run.TICK] = tick;
    state[run.PRINT] = printA >>> 0;
    state[run.PRINT + 1] = printB >>> 0;
    return done;
  }
}
