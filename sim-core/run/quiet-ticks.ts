import {type Controller} from '../control/controller';
import * as control from '../control/controller-state';
import * as phases from '../control/phases';
import * as seen from '../control/seen';
import * as set from '../control/tuning';
import {LEAST_FADE} from '../plant/brake';
import {type Drive} from '../plant/drive';
import {DRAG_FULL_MPS, type Equations} from '../plant/equations';
import * as now from '../plant/evaluation';
import {type Line} from '../plant/line';
import {type Plant} from '../plant/plant';
import * as at from '../plant/plant-state';
import {GREATEST_SHARE, LEAST_SHARE} from '../plant/sensing';
import {type Grid, withinTurn} from '../plant/stand';
import {type Scenario} from '../scenario/scenario';
import {type Points} from '../signal/points';
import {normalOf, rotated} from '../signal/random';
import {sineAndCosine, TWO_PI} from '../signal/sine';
import {MIX_A, MIX_B} from './hash';
import * as table from './quiet-steps';
import {MOST_STEPS, QUIET_RAD, QUIET_SHARE, QuietSteps} from './quiet-steps';
import * as run from './run-state';
import {COLUMN, TRACE_COLUMNS, type TraceBlock} from './trace';
import {type Watch} from './watch';

/** A roll with less web than this may run out within a tick [m]. */
const NEARLY_EMPTY_M = 5;

const COLUMNS = TRACE_COLUMNS.length;

/** What a run lends to its quiet ticks: the very arrays and objects that its careful ticks work with. */
export interface QuietParts {
  readonly scenario: Scenario;
  readonly grid: Grid;
  readonly plant: Plant;
  readonly controller: Controller;
  readonly watch: Watch;
  readonly state: Float64Array;
  readonly printed: Uint32Array;
}

/**
 * The hot loop: control ticks in which nothing bends, that is, taut web on a turning roll, the line above a crawl
 * and without a kink in its speed, a dancer between its stops. Four stages of Runge–Kutta as in `plant.ts`, but
 * with the strain as state, radius and inertia as lines over the tick, the turn of an uneven roll by series, and
 * two to five milliseconds a step. Whatever it meets that is not so it leaves to the careful tick. Nothing is
 * carried from tick to tick but the run's state, so a run may be cut anywhere.
 */
export class QuietTicks {
  /** A tick was begun, its control done, and bent before its end: the plant still has to move. */
  isOpen = false;

  private readonly steps: QuietSteps;
  private readonly p: Float64Array;
  private readonly c: Float64Array;
  private readonly random: Float64Array;
  private readonly line: Line;
  private readonly drive: Drive;
  private readonly equations: Equations;
  private readonly curve: Points;
  private readonly isFit: boolean;
  /** Sine and cosine of the roll's angle. */
  private readonly angle = new Float64Array(2);

  constructor(private readonly parts: QuietParts) {
    const {scenario, grid, plant, state} = parts;
    const {brake, sensing, web} = scenario;
    this.p = state.subarray(run.PLANT);
    this.c = state.subarray(run.CONTROLLER, run.PLANT);
    this.random = state.subarray(run.RANDOM, run.WATCH);
    this.line = plant.line;
    this.drive = plant.drive;
    this.equations = plant.equations;
    this.curve = plant.equations.curve;
    this.steps = new QuietSteps(scenario, grid, plant.drive.changesAtStep);
    const oneLag = (brake.lagUpS ?? brake.lagS) === (brake.lagDownS ?? brake.lagS);
    this.isFit =
      (sensing.kind === 'dancer' || sensing.filterS > 0) &&
      oneLag &&
      (web.maxwellModulusPa ?? 0) === 0 &&
      (scenario.span.rollerRunoutM ?? 0) === 0;
  }

  /** Runs at most `most` ticks, the first bent one excluded; answers how many it finished. */
  advance(most: number, block?: TraceBlock): number {
    const {p, c, random, line, drive, curve, steps, angle, parts} = this;
    this.isOpen = false;
    if (!this.isFit || p[at.RIPPLE] !== 0 || p[at.LOADED] !== 0) return 0;
    const {state, watch, controller, printed} = parts;
    const {news, tuning} = controller;
    const n = this.equations.now;
    const rows = steps.table;
    const {sampleS} = parts.grid;

    const coreSquare = n[now.CORE_SQUARE]!;
    const perLength = n[now.PER_LENGTH]!;
    const inertiaAtZero = n[now.INERTIA_AT_ZERO]!;
    const inertiaPerFourth = n[now.INERTIA_PER_FOURTH]!;
    const perWound = n[now.PER_WOUND]!;
    const stiffness = n[now.STIFFNESS]!;
    const lossNS = stiffness * n[now.LOSS_S]!;
    const breakN = n[now.BREAK_N]!;
    const spanM = n[now.SPAN_M]!;
    const perSpan = n[now.PER_SPAN]!;
    const idlerN = n[now.IDLER_N]!;
    const idlerKg = n[now.IDLER_KG]!;
    const coulomb = n[now.COULOMB]!;
    const viscous = n[now.VISCOUS]!;
    const residual = n[now.RESIDUAL]!;
    const torqueSpan = n[now.TORQUE_SPAN]!;
    const extraGrip = n[now.EXTRA_GRIP]!;
    const perGripSpeed = n[now.PER_GRIP_SPEED]!;
    const fadePerK = n[now.FADE_PER_K]!;
    const fadeStart = n[now.FADE_START]!;
    const perCapacity = n[now.PER_CAPACITY]!;
    const conductance = n[now.CONDUCTANCE]!;
    const ambient = n[now.AMBIENT]!;
    const isOut = n[now.OUT_OF_ROUND] === 1;
    const eccentricity = p[at.ECCENTRICITY]!;
    const oval = p[at.OVAL]!;
    const zeroN = p[at.ZERO]!;
    const share = p[at.SPAN_PCT]! / 100;
    const noiseN = n[now.NOISE]!;
    const leastN = LEAST_SHARE * n[now.RANGE]!;
    const greatestN = GREATEST_SHARE * n[now.RANGE]!;
    const isDancer = this.equations.hasDancer;
    const travelM = n[now.TRAVEL]!;
    const perMass = n[now.PER_MASS]!;
    const damping = n[now.DAMPING]!;
    const perRange = 100 / (isDancer ? travelM : n[now.RANGE]!);
    const sense = isDancer ? -1 : 1;
    const {changesAtS, fewest} = steps;
    const slowMps = DRAG_FULL_MPS;
    const leastFade = LEAST_FADE;
    const turn = TWO_PI;
    const late = table.LATE;

    // the controller's settings, and whether the PID below is all there is to it while the phase goes on
    const zeroAdjust = tuning[set.ZERO_ADJUST]!;
    const inputGain = tuning[set.INPUT_GAIN]!;
    const inputFilterS = tuning[set.INPUT_FILTER_S]!;
    const inputShare = inputFilterS > 0 ? sampleS / (sampleS + inputFilterS) : 1;
    const target = tuning[set.TARGET]!;
    const mostRise = tuning[set.RATE]! > 0 ? tuning[set.RATE]! * sampleS : Infinity;
    const perReference = tuning[set.PER_REFERENCE]!;
    const gain = sense * tuning[set.KP]!; // signed: more of a dancer's travel asks for more brake
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
    // (step × natural frequency)² and the like, for one step in the tick
    const swing = (stiffness * perSpan * sampleS * sampleS) / (QUIET_RAD * QUIET_RAD);
    const loss = (lossNS * perSpan * sampleS) / QUIET_SHARE;
    const calm = (damping * perMass * sampleS) / QUIET_SHARE;
    const fall = ((residual + torqueSpan) * extraGrip * perGripSpeed * sampleS) / QUIET_SHARE;
    const words = printed.length;

    const stretchLimit = watch.stretchLimit;
    const hotC = watch.hotC;
    let isIdle = watch.isIdle();

    const mixA = MIX_A;
    const mixB = MIX_B;
    let word0 = random[0]! | 0;
    let word1 = random[1]! | 0;
    let word2 = random[2]! | 0;
    let word3 = random[3]! | 0;
    const lastMps = line.lastMps;
    let isSteady = false;
    let tick = state[run.TICK]! | 0;
    let printA = state[run.PRINT]! | 0;
    let printB = state[run.PRINT + 1]! | 0;
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
      const omega0 = p[at.OMEGA]!;
      const wound0 = p[at.WOUND]!;
      const length0 = p[at.LENGTH]!;
      if (!(c0 >= slowMps && c0 + sampleS * (c1 + sampleS * c2) >= slowMps)) break;
      let dancer = p[at.DANCER]!;
      const path0 = spanM + 2 * dancer;
      if (!(omega0 > 0 && length0 < path0 && wound0 > NEARLY_EMPTY_M)) break;
      if (isDancer && !(dancer > 0 && dancer < travelM)) break;

      // roll: R and 1/J and their slopes over the tick, from one root and one division
      const square = coreSquare + perLength * wound0;
      const radius0 = Math.sqrt(square);
      const inertia = inertiaAtZero + inertiaPerFourth * square * square;
      const inverse = 1 / (2 * radius0 * inertia);
      const perInertia0 = 2 * radius0 * inverse;
      const radiusSlope = -perLength * omega0 * radius0 * perWound * inertia * inverse;
      const perInertiaSlope =
        -4 * perInertia0 * perInertia0 * inertiaPerFourth * square * radius0 * radiusSlope;

      // how finely
      const yields = square * perInertia0 + 4 * perMass; // [1/kg]
      let fine = fewest;
      while (
        fine * fine < swing * yields ||
        fine < loss * yields + calm ||
        fine < fall * perInertia0 ||
        (isOut && fine * QUIET_RAD < 2 * omega0 * sampleS)
      )
        fine++;
      if (fine > MOST_STEPS) break;

      // brake: where on its curve, how faded
      let x = p[at.DRIVE]!;
      let heat = p[at.HEAT]!;
      let filter = p[at.FILTER]!;
      let piece = curve.piece(x);
      let atPiece = curve.start(piece);
      let onPiece = curve.rise(piece);
      let faded = heat > fadeStart ? Math.max(leastFade, 1 - fadePerK * (heat - fadeStart)) : 1;

      if (block !== undefined) {
        const to = block.count * COLUMNS;
        const out = block.rows;
        const z = omega0 * perGripSpeed;
        out[to + COLUMN.tensionN] = p[at.TENSION]!;
        out[to + COLUMN.measuredN] = filter;
        out[to + COLUMN.outputPct] = c[control.APPLIED]!;
        out[to + COLUMN.lineMps] = c0;
        out[to + COLUMN.rollRadps] = omega0;
        out[to + COLUMN.radiusM] = radius0;
        out[to + COLUMN.slackM] = 0;
        out[to + COLUMN.torqueNm] =
          (residual + torqueSpan * (atPiece + onPiece * x)) * faded * (1 + extraGrip / (1 + z * z));
        out[to + COLUMN.brakeC] = heat;
        out[to + COLUMN.dancerM] = dancer;
      }

      // sample: xoshiro128** as in random.ts, its words in locals
      let sample = dancer;
      if (!isDancer) {
        const word = rotated(Math.imul(word1, 5), 7);
        const shifted = word1 << 9;
        word2 ^= word0;
        word3 ^= word1;
        word1 ^= word2;
        word0 ^= word3;
        word2 ^= shifted;
        word3 = rotated(word3, 11);
        sample = filter;
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
        if (!isDancer) {
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
        const wanted = perReference > 0 ? inner * radius0 * perReference : inner;
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
        c[control.RADIUS] = radius0;
        c[control.INTEGRAL] = integral;
        c[control.DERIVATIVE] = derivative;
        c[control.LAST_Y] = y;
        c[control.LIMIT] = limit;
        c[control.OUTPUT] = output;
        c[control.APPLIED] = output;
      } else {
        news[seen.RAN] = 0;
        news[seen.STOPPED] = seen.NO_STOP;
        if (isDancer) news[seen.DANCER_PCT] = perRange * sample;
        else news[seen.SAMPLE_N] = sample;
        news[seen.TICK] = tick;
        news[seen.STANDS] = line.stands(t) ? 1 : 0;
        news[seen.MEAN_RADIUS] = radius0;
        news[seen.OMEGA] = omega0;
        news[seen.LINE_MPS] = c0;
        news[seen.LINE_SLOPE] = c1;
        controller.tick();
        watch.phase(tick, c[control.PHASE]!);
      }
      if (block !== undefined) {
        const to = block.count * COLUMNS;
        block.rows[to + COLUMN.setPointN] = c[control.SET_POINT]!;
        block.rows[to + COLUMN.phase] = c[control.PHASE]!;
        block.count++;
      }
      drive.command(tick, c[control.APPLIED]!);

      // plant
      let omega = omega0;
      let theta = p[at.THETA]!;
      let wound = wound0;
      let s = path0 / length0; // 1 + strain
      let dancerSpeed = p[at.DANCER_SPEED]!;
      const loadingN = c[control.SET_POINT]!;
      let cos = 0;
      let sin = 0;
      if (isOut) {
        sineAndCosine(theta, angle);
        sin = angle[0]!;
        cos = angle[1]!;
      }
      // pull of the web on the roll within which nothing bends [N]
      const idlerA = idlerN + idlerKg * c1;
      const idlerB = idlerA + idlerKg * 2 * sampleS * c2;
      const floorN = Math.max(0, -idlerA, -idlerB);
      const ceilingN = breakN - Math.max(idlerA, idlerB);

      let into = 0; // [s into the tick]
      let part = changesAtS > 0 ? fine * table.ROW : late + fine * table.ROW;
      let command = changesAtS > 0 ? drive.early(tick) : drive.late(tick);
      let isQuiet = true;
      for (;;) {
        const stepS = rows[part + table.STEP_S]!;
        const half = stepS / 2;
        const sixth = stepS / 6;
        const halfDecay = rows[part + table.HALF_DECAY]!;
        const fullDecay = rows[part + table.FULL_DECAY]!;
        const filter1 = share * rows[part + table.FILTER_1]!;
        const filter2 = share * rows[part + table.FILTER_2]!;
        const filter3 = share * rows[part + table.FILTER_3]!;
        const filter4 = share * rows[part + table.FILTER_4]!;
        const keeps = rows[part + table.FILTER_KEEPS]!;
        const heats = rows[part + table.HEAT_S]! * perCapacity;
        if (fullDecay === 0 && x !== command) {
          x = command;
          piece = curve.piece(x);
          atPiece = curve.start(piece);
          onPiece = curve.rise(piece);
        }
        const leavesPiece = curve.piece(command) !== piece;
        for (let step = rows[part + table.STEPS]!; step > 0; step--) {
          const gap = x - command;
          const xMiddle = command + gap * halfDecay;
          const xEnd = command + gap * fullDecay;
          const base = faded * (residual + torqueSpan * atPiece);
          const perDrive = faded * torqueSpan * onPiece;
          let drag1 = base + perDrive * x;
          let drag2 = base + perDrive * xMiddle;
          let drag3 = drag2;
          let drag4 = base + perDrive * xEnd;

          const middle = into + half;
          const end = into + stepS;
          const v1 = c0 + into * (c1 + into * c2);
          const v2 = c0 + middle * (c1 + middle * c2);
          const v4 = c0 + end * (c1 + end * c2);
          const lost1 = stiffness + idlerN + idlerKg * (c1 + 2 * into * c2);
          const lost2 = stiffness + idlerN + idlerKg * (c1 + 2 * middle * c2);
          const lost4 = stiffness + idlerN + idlerKg * (c1 + 2 * end * c2);
          const perInertia = perInertia0 + perInertiaSlope * middle;
          const slowed = perInertia * viscous;

          // Each stage: paid out [m/s], slope of the strain, pull on the roll [N], slope of its speed.
          // stage 1
          let r = radius0 + radiusSlope * into;
          if (isOut) r += eccentricity * cos + oval * (2 * cos * cos - 1);
          if (extraGrip > 0) {
            const z = omega * perGripSpeed;
            drag1 += (drag1 * extraGrip) / (1 + z * z);
          }
          const paid1 = omega * (r * perWound);
          let perPath = perSpan;
          let nip = v1;
          if (isDancer) {
            perPath = 1 / (spanM + 2 * dancer);
            nip += 2 * dancerSpeed;
          }
          const slope1 = s * perPath * nip - s * s * perPath * paid1;
          const pull1 = stiffness * s - lost1 + lossNS * slope1;
          const turn1 = perInertia * r * pull1 - (perInertia * (drag1 + coulomb) + slowed * omega);
          const push1 = isDancer
            ? perMass * (2 * (loadingN - (pull1 + (lost1 - stiffness))) - damping * dancerSpeed)
            : 0;

          // stage 2
          const omega2 = omega + half * turn1;
          const s2 = s + half * slope1;
          r = radius0 + radiusSlope * middle;
          if (isOut) {
            const d = half * omega;
            const dd = d * d;
            const wave =
              cos * (1 - (dd / 2) * (1 - dd / 12)) - sin * d * (1 - (dd / 6) * (1 - dd / 20));
            r += eccentricity * wave + oval * (2 * wave * wave - 1);
          }
          if (extraGrip > 0) {
            const z = omega2 * perGripSpeed;
            drag2 += (drag2 * extraGrip) / (1 + z * z);
          }
          const paid2 = omega2 * (r * perWound);
          let dancerSpeed2 = 0;
          perPath = perSpan;
          nip = v2;
          if (isDancer) {
            dancerSpeed2 = dancerSpeed + half * push1;
            perPath = 1 / (spanM + 2 * (dancer + half * dancerSpeed));
            nip += 2 * dancerSpeed2;
          }
          const slope2 = s2 * perPath * nip - s2 * s2 * perPath * paid2;
          const pull2 = stiffness * s2 - lost2 + lossNS * slope2;
          const turn2 = perInertia * r * pull2 - (perInertia * (drag2 + coulomb) + slowed * omega2);
          const push2 = isDancer
            ? perMass * (2 * (loadingN - (pull2 + (lost2 - stiffness))) - damping * dancerSpeed2)
            : 0;

          // stage 3
          const omega3 = omega + half * turn2;
          const s3 = s + half * slope2;
          if (isOut) {
            r = radius0 + radiusSlope * middle;
            const d = half * omega2;
            const dd = d * d;
            const wave =
              cos * (1 - (dd / 2) * (1 - dd / 12)) - sin * d * (1 - (dd / 6) * (1 - dd / 20));
            r += eccentricity * wave + oval * (2 * wave * wave - 1);
          }
          if (extraGrip > 0) {
            const z = omega3 * perGripSpeed;
            drag3 += (drag3 * extraGrip) / (1 + z * z);
          }
          const paid3 = omega3 * (r * perWound);
          let dancerSpeed3 = 0;
          perPath = perSpan;
          nip = v2;
          if (isDancer) {
            dancerSpeed3 = dancerSpeed + half * push2;
            perPath = 1 / (spanM + 2 * (dancer + half * dancerSpeed2));
            nip += 2 * dancerSpeed3;
          }
          const slope3 = s3 * perPath * nip - s3 * s3 * perPath * paid3;
          const pull3 = stiffness * s3 - lost2 + lossNS * slope3;
          const turn3 = perInertia * r * pull3 - (perInertia * (drag3 + coulomb) + slowed * omega3);
          const push3 = isDancer
            ? perMass * (2 * (loadingN - (pull3 + (lost2 - stiffness))) - damping * dancerSpeed3)
            : 0;

          // stage 4
          const omega4 = omega + stepS * turn3;
          const s4 = s + stepS * slope3;
          r = radius0 + radiusSlope * end;
          if (isOut) {
            const d = stepS * omega3;
            const dd = d * d;
            const wave =
              cos * (1 - (dd / 2) * (1 - dd / 12)) - sin * d * (1 - (dd / 6) * (1 - dd / 20));
            r += eccentricity * wave + oval * (2 * wave * wave - 1);
          }
          if (extraGrip > 0) {
            const z = omega4 * perGripSpeed;
            drag4 += (drag4 * extraGrip) / (1 + z * z);
          }
          const paid4 = omega4 * (r * perWound);
          let dancerSpeed4 = 0;
          perPath = perSpan;
          nip = v4;
          if (isDancer) {
            dancerSpeed4 = dancerSpeed + stepS * push3;
            perPath = 1 / (spanM + 2 * (dancer + stepS * dancerSpeed3));
            nip += 2 * dancerSpeed4;
          }
          const slope4 = s4 * perPath * nip - s4 * s4 * perPath * paid4;
          const pull4 = stiffness * s4 - lost4 + lossNS * slope4;
          const turn4 = perInertia * r * pull4 - (perInertia * (drag4 + coulomb) + slowed * omega4);
          const push4 = isDancer
            ? perMass * (2 * (loadingN - (pull4 + (lost4 - stiffness))) - damping * dancerSpeed4)
            : 0;

          const turned = sixth * (omega + 2 * (omega2 + omega3) + omega4);
          const power =
            (drag1 * omega + 2 * (drag2 * omega2 + drag3 * omega3) + drag4 * omega4) / 6;
          omega += sixth * (turn1 + 2 * (turn2 + turn3) + turn4);
          s += sixth * (slope1 + 2 * (slope2 + slope3) + slope4);
          if (isDancer) {
            dancer += sixth * (dancerSpeed + 2 * (dancerSpeed2 + dancerSpeed3) + dancerSpeed4);
            dancerSpeed += sixth * (push1 + 2 * (push2 + push3) + push4);
            if (!(dancer > 0 && dancer < travelM)) {
              isQuiet = false;
              break;
            }
          }
          if (
            !(pull1 > floorN && pull2 > floorN && pull3 > floorN && pull4 > floorN) ||
            !(pull1 < ceilingN && pull2 < ceilingN && pull3 < ceilingN && pull4 < ceilingN) ||
            !(omega > 0 && s > 1) ||
            (leavesPiece && curve.piece(xEnd) !== piece)
          ) {
            isQuiet = false;
            break;
          }
          wound -= sixth * (paid1 + 2 * (paid2 + paid3) + paid4);
          theta += turned;
          filter =
            zeroN +
            keeps * (filter - zeroN) +
            (filter1 * (pull1 + (lost1 - stiffness)) +
              filter2 * (pull2 + (lost2 - stiffness)) +
              (filter3 * (pull3 + (lost2 - stiffness)) + filter4 * (pull4 + (lost4 - stiffness))));
          heat += heats * (power - conductance * (heat - ambient));
          if (isOut) {
            const dd = turned * turned;
            const near = 1 - (dd / 2) * (1 - (dd / 12) * (1 - dd / 30));
            const far = turned * (1 - (dd / 6) * (1 - (dd / 20) * (1 - dd / 42)));
            const before = cos;
            cos = cos * near - sin * far;
            sin = sin * near + before * far;
          }
          if (heat > fadeStart) faded = Math.max(leastFade, 1 - fadePerK * (heat - fadeStart));
          else faded = 1;
          x = xEnd;
          into = end;
        }
        if (!isQuiet || part >= late) break;
        part = late + fine * table.ROW;
        command = drive.late(tick);
        into = changesAtS;
      }

      // the tension at the end of the tick
      let radius = radius0 + radiusSlope * sampleS;
      if (isOut) radius += eccentricity * cos + oval * (2 * cos * cos - 1);
      const path = spanM + 2 * dancer;
      const nipEnd = c0 + sampleS * (c1 + sampleS * c2) + 2 * dancerSpeed;
      const slope = (s * nipEnd - s * s * omega * (radius * perWound)) / path;
      const tension = stiffness * (s - 1) + lossNS * slope;
      if (!isQuiet || !(tension > 0 && tension < breakN)) {
        this.isOpen = true;
        break;
      }
      p[at.OMEGA] = omega;
      p[at.THETA] = theta < turn ? theta : withinTurn(theta);
      p[at.WOUND] = wound;
      p[at.LENGTH] = path / s;
      if (isDancer) {
        p[at.DANCER] = dancer;
        p[at.DANCER_SPEED] = dancerSpeed;
      }
      p[at.HEAT] = heat;
      p[at.FILTER] = filter;
      p[at.DRIVE] = x;
      p[at.TENSION] = tension;
      p[at.STRAIN] = s - 1;

      const limit = c[control.LIMIT]!;
      if (!(isIdle && limit === 0 && s - 1 <= stretchLimit && heat <= hotC)) {
        const limitPct = controller.limitPct();
        watch.look(tick, {
          slackM: 0,
          strain: s - 1,
          brakeC: heat,
          isAtStop: false,
          limit,
          limitPct,
        });
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
