import {LEAST_FADE} from '../plant/brake';
import * as now from '../plant/evaluation';
import * as at from '../plant/plant-state';
import {withinTurn} from '../plant/stand';
import * as of from './quiet-plant';
import {QuietPlant} from './quiet-plant';
import * as table from './quiet-steps';

/** Quiet ticks of a dancer stand: the path moves with the dancer, the web pulls it twice. */
export class QuietDancer extends QuietPlant {
  override through(tick: number): boolean {
    if (!this.prepare()) return false;
    const {p, now: n, curve, drive, steps, made, sampleS} = this;
    const c0 = made[of.C0]!;
    const c1 = made[of.C1]!;
    const c2 = made[of.C2]!;
    const radius0 = made[of.RADIUS]!;
    const radiusSlope = made[of.RADIUS_SLOPE]!;
    const perInertia0 = made[of.PER_INERTIA]!;
    const perInertiaSlope = made[of.PER_INERTIA_SLOPE]!;
    const floorN = made[of.FLOOR]!;
    const ceilingN = made[of.CEILING]!;
    const rows = steps.table;
    const {changesAtS} = steps;
    const leastFade = LEAST_FADE;
    const late = table.LATE;
    const loadingN = made[of.LOADING]!;
    const perWound = n[now.PER_WOUND]!;
    const stiffness = n[now.STIFFNESS]!;
    const lossNS = stiffness * n[now.LOSS_S]!;
    const breakN = n[now.BREAK_N]!;
    const spanM = n[now.SPAN_M]!;
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
    const travelM = n[now.TRAVEL]!;
    const perMass = n[now.PER_MASS]!;
    const damping = n[now.DAMPING]!;

    // brake: where on its curve, how faded
    let x = p[at.DRIVE]!;
    let heat = p[at.HEAT]!;
    let piece = curve.piece(x);
    let atPiece = curve.start(piece);
    let onPiece = curve.rise(piece);
    let faded = heat > fadeStart ? Math.max(leastFade, 1 - fadePerK * (heat - fadeStart)) : 1;

    let omega = p[at.OMEGA]!;
    let theta = p[at.THETA]!;
    let wound = p[at.WOUND]!;
    let dancer = p[at.DANCER]!;
    let dancerSpeed = p[at.DANCER_SPEED]!;
    let stretch = (spanM + 2 * dancer) / p[at.LENGTH]!; // 1 + strain
    let sin = made[of.SINE]!;
    let cos = made[of.COSINE]!;
    const fine = made[of.FINE]! * table.ROW;

    let into = 0; // [s into the tick]
    let part = changesAtS > 0 ? fine : late + fine;
    let command = changesAtS > 0 ? drive.early(tick) : drive.late(tick);
    for (;;) {
      const stepS = rows[part + table.STEP_S]!;
      const half = stepS / 2;
      const sixth = stepS / 6;
      const halfDecay = rows[part + table.HALF_DECAY]!;
      const fullDecay = rows[part + table.FULL_DECAY]!;
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
        let r1 = radius0 + radiusSlope * into;
        let r2 = radius0 + radiusSlope * middle;
        let r4 = radius0 + radiusSlope * end;
        let bend2 = 0; // slope of the radius over the angle [m/rad]
        let bend4 = 0;
        if (isOut) {
          // the turn to middle and end at the speed of the start; what the stages add is small and goes along the slope
          r1 += eccentricity * cos + oval * (2 * cos * cos - 1);
          const a = half * omega;
          const aa = a * a;
          const near = 1 - (aa / 2) * (1 - aa / 12);
          const far = a * (1 - (aa / 6) * (1 - aa / 20));
          const cos2 = cos * near - sin * far;
          const sin2 = sin * near + cos * far;
          const cos4 = cos2 * near - sin2 * far;
          const sin4 = sin2 * near + cos2 * far;
          r2 += eccentricity * cos2 + oval * (2 * cos2 * cos2 - 1);
          r4 += eccentricity * cos4 + oval * (2 * cos4 * cos4 - 1);
          bend2 = -sin2 * (eccentricity + 4 * oval * cos2);
          bend4 = -sin4 * (eccentricity + 4 * oval * cos4);
        }
        if (extraGrip > 0) {
          const z = omega * perGripSpeed;
          drag1 += (drag1 * extraGrip) / (1 + z * z);
        }
        const paid1 = omega * (r1 * perWound);
        let perPath = 1 / (spanM + 2 * dancer);
        const slope1 =
          stretch * perPath * (v1 + 2 * dancerSpeed) - stretch * stretch * perPath * paid1;
        const pull1 = stiffness * stretch - lost1 + lossNS * slope1;
        const turn1 = perInertia * r1 * pull1 - (perInertia * (drag1 + coulomb) + slowed * omega);
        const push1 =
          perMass * (2 * (loadingN - (pull1 + (lost1 - stiffness))) - damping * dancerSpeed);

        // stage 2
        const omega2 = omega + half * turn1;
        const stretch2 = stretch + half * slope1;
        if (extraGrip > 0) {
          const z = omega2 * perGripSpeed;
          drag2 += (drag2 * extraGrip) / (1 + z * z);
        }
        const paid2 = omega2 * (r2 * perWound);
        const dancerSpeed2 = dancerSpeed + half * push1;
        perPath = 1 / (spanM + 2 * (dancer + half * dancerSpeed));
        const slope2 =
          stretch2 * perPath * (v2 + 2 * dancerSpeed2) - stretch2 * stretch2 * perPath * paid2;
        const pull2 = stiffness * stretch2 - lost2 + lossNS * slope2;
        const turn2 = perInertia * r2 * pull2 - (perInertia * (drag2 + coulomb) + slowed * omega2);
        const push2 =
          perMass * (2 * (loadingN - (pull2 + (lost2 - stiffness))) - damping * dancerSpeed2);

        // stage 3
        const omega3 = omega + half * turn2;
        const stretch3 = stretch + half * slope2;
        if (extraGrip > 0) {
          const z = omega3 * perGripSpeed;
          drag3 += (drag3 * extraGrip) / (1 + z * z);
        }
        const r3 = r2 + bend2 * half * (omega2 - omega);
        const paid3 = omega3 * (r3 * perWound);
        const dancerSpeed3 = dancerSpeed + half * push2;
        perPath = 1 / (spanM + 2 * (dancer + half * dancerSpeed2));
        const slope3 =
          stretch3 * perPath * (v2 + 2 * dancerSpeed3) - stretch3 * stretch3 * perPath * paid3;
        const pull3 = stiffness * stretch3 - lost2 + lossNS * slope3;
        const turn3 = perInertia * r3 * pull3 - (perInertia * (drag3 + coulomb) + slowed * omega3);
        const push3 =
          perMass * (2 * (loadingN - (pull3 + (lost2 - stiffness))) - damping * dancerSpeed3);

        // stage 4
        const omega4 = omega + stepS * turn3;
        const stretch4 = stretch + stepS * slope3;
        if (extraGrip > 0) {
          const z = omega4 * perGripSpeed;
          drag4 += (drag4 * extraGrip) / (1 + z * z);
        }
        r4 += bend4 * stepS * (omega3 - omega);
        const paid4 = omega4 * (r4 * perWound);
        const dancerSpeed4 = dancerSpeed + stepS * push3;
        perPath = 1 / (spanM + 2 * (dancer + stepS * dancerSpeed3));
        const slope4 =
          stretch4 * perPath * (v4 + 2 * dancerSpeed4) - stretch4 * stretch4 * perPath * paid4;
        const pull4 = stiffness * stretch4 - lost4 + lossNS * slope4;
        const turn4 = perInertia * r4 * pull4 - (perInertia * (drag4 + coulomb) + slowed * omega4);
        const push4 =
          perMass * (2 * (loadingN - (pull4 + (lost4 - stiffness))) - damping * dancerSpeed4);

        const turned = sixth * (omega + 2 * (omega2 + omega3) + omega4);
        const power = (drag1 * omega + 2 * (drag2 * omega2 + drag3 * omega3) + drag4 * omega4) / 6;
        omega += sixth * (turn1 + 2 * (turn2 + turn3) + turn4);
        stretch += sixth * (slope1 + 2 * (slope2 + slope3) + slope4);
        dancer += sixth * (dancerSpeed + 2 * (dancerSpeed2 + dancerSpeed3) + dancerSpeed4);
        dancerSpeed += sixth * (push1 + 2 * (push2 + push3) + push4);
        if (!(dancer > 0 && dancer < travelM)) return false;
        if (
          !(pull1 > floorN && pull2 > floorN && pull3 > floorN && pull4 > floorN) ||
          !(pull1 < ceilingN && pull2 < ceilingN && pull3 < ceilingN && pull4 < ceilingN) ||
          !(omega > 0 && stretch > 1) ||
          (leavesPiece && curve.piece(xEnd) !== piece)
        ) {
          return false;
        }
        wound -= sixth * (paid1 + 2 * (paid2 + paid3) + paid4);
        theta += turned;
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
      if (part >= late) break;
      part = late + fine;
      command = drive.late(tick);
      into = changesAtS;
    }

    // the tension at the end of the tick
    let radius = radius0 + radiusSlope * sampleS;
    if (isOut) radius += eccentricity * cos + oval * (2 * cos * cos - 1);
    const path = spanM + 2 * dancer;
    const nipEnd = c0 + sampleS * (c1 + sampleS * c2) + 2 * dancerSpeed;
    const slope = (stretch * nipEnd - stretch * stretch * omega * (radius * perWound)) / path;
    const tension = stiffness * (stretch - 1) + lossNS * slope;
    if (!(tension > 0 && tension < breakN)) return false;
    p[at.OMEGA] = omega;
    p[at.THETA] = withinTurn(theta); // asked each time: a way first taken late makes the loop compile anew
    p[at.WOUND] = wound;
    p[at.LENGTH] = path / stretch;
    p[at.DANCER] = dancer;
    p[at.DANCER_SPEED] = dancerSpeed;
    p[at.HEAT] = heat;
    p[at.DRIVE] = x;
    p[at.TENSION] = tension;
    p[at.STRAIN] = stretch - 1;
    return true;
  }
}
