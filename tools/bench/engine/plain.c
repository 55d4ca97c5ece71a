/*
 * The model of sim-core/PHYSICS.md in plain C: classical Runge-Kutta of the fourth order at the plant step of the
 * document (1 ms), the brake's hold and the dancer's stops as explicit states, libm's functions. It is what the
 * benchmark compares the engine with, and it meets the reference cases at 0.02 % of range as the engine does.
 *
 *   plain FILE rows     every tenth of a second: time and tension
 *   plain FILE time N   N runs without rows: seconds of each, and a sum over the last states
 *   plain FILE keep N   the same, keeping twelve columns a tick in memory
 *
 * FILE has a line for each key of the document, "key value", then "line at run|stop|fastStop speed ramp",
 * "set at key value", and "point x y" for the brake's curve.
 */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <time.h>

#define MOST 64
enum { OMEGA, THETA, WOUND, LENGTH, HEAT, FILTER, DRIVE, DANCER, SPEED, STATES };
enum { STANDSTILL, STARTING, RUNNING, STOPPING, MANUAL };

typedef struct { double at; int kind; double speed, ramp; } Command; /* kind 0 run, 1 stop, 2 fast stop */
typedef struct { double at; char key[32]; double value; } Change;

/* ---- document ---- */
static struct Document {
  double durationS, seed, initialTensionN, lineRoundS, plantStepS;
  double widthM, thicknessM, modulusPa, densityKgM3, breakNPerM, lossTimeS;
  double coreRadiusM, radiusM, coreInertiaKgM2, woundTensionN, eccentricityM, ovalM, coulombNm, viscousNmS;
  double lengthM, idlerDragN, idlerMassKg;
  double maxTorqueNm, residualTorqueNm, lagS, deadTimeS, playPct, stickPct, breakaway, breakawayRadps;
  double capacityJPerK, conductanceWPerK, ambientC, fadePerK, fadeStartC;
  double isDancer, rangeN, filterS, noiseN, zeroN, spanPct, travelM, massKg, dampingNsPerM;
  double sampleS, kp, tiS, tdS, derivativeN, setPointWeight, outMinPct, outMaxPct, setPointN, startRampS;
  double startFraction, standstillPct, stopHoldS, stopHoldGain, radiusCompensation, radiusRefM, inertiaAssistPct;
  double setPointRateNps, startOutputPct, closeAboveN, startHoldS, zeroAdjustN, spanAdjustPct, inputSign;
  double inputFilterS;
} d;
#define KEY(k) { #k, &d.k }
static struct { const char *name; double *place; } keys[] = {
  KEY(durationS), KEY(seed), KEY(initialTensionN), KEY(lineRoundS), KEY(plantStepS), KEY(widthM), KEY(thicknessM),
  KEY(modulusPa), KEY(densityKgM3), KEY(breakNPerM), KEY(lossTimeS), KEY(coreRadiusM), KEY(radiusM),
  KEY(coreInertiaKgM2), KEY(woundTensionN), KEY(eccentricityM), KEY(ovalM), KEY(coulombNm), KEY(viscousNmS),
  KEY(lengthM), KEY(idlerDragN), KEY(idlerMassKg), KEY(maxTorqueNm), KEY(residualTorqueNm), KEY(lagS),
  KEY(deadTimeS), KEY(playPct), KEY(stickPct), KEY(breakaway), KEY(breakawayRadps), KEY(capacityJPerK),
  KEY(conductanceWPerK), KEY(ambientC), KEY(fadePerK), KEY(fadeStartC), KEY(isDancer), KEY(rangeN), KEY(filterS),
  KEY(noiseN), KEY(zeroN), KEY(spanPct), KEY(travelM), KEY(massKg), KEY(dampingNsPerM), KEY(sampleS), KEY(kp),
  KEY(tiS), KEY(tdS), KEY(derivativeN), KEY(setPointWeight), KEY(outMinPct), KEY(outMaxPct), KEY(setPointN),
  KEY(startRampS), KEY(startFraction), KEY(standstillPct), KEY(stopHoldS), KEY(stopHoldGain),
  KEY(radiusCompensation), KEY(radiusRefM), KEY(inertiaAssistPct), KEY(setPointRateNps), KEY(startOutputPct),
  KEY(closeAboveN), KEY(startHoldS), KEY(zeroAdjustN), KEY(spanAdjustPct), KEY(inputSign), KEY(inputFilterS),
};
static Command commands[MOST];
static Change changes[MOST];
static int nCommands, nChanges, nPoints;
static double curveX[MOST], curveY[MOST];

static double *placeOf(const char *name) {
  for (size_t i = 0; i < sizeof keys / sizeof *keys; i++)
    if (strcmp(keys[i].name, name) == 0) return keys[i].place;
  fprintf(stderr, "unknown key %s\n", name);
  exit(2);
}

static void readDocument(const char *file) {
  char line[256], word[32], key[32];
  double a, b, c;
  FILE *in = fopen(file, "r");
  if (!in) { perror(file); exit(2); }
  while (fgets(line, sizeof line, in)) {
    if (sscanf(line, "line %lf %31s %lf %lf", &a, word, &b, &c) == 4) {
      int kind = word[0] == 'r' ? 0 : word[0] == 's' ? 1 : 2;
      commands[nCommands++] = (Command){a, kind, kind == 0 ? b : 0, c};
    } else if (sscanf(line, "set %lf %31s %lf", &a, key, &b) == 3) {
      changes[nChanges].at = a;
      changes[nChanges].value = b;
      strcpy(changes[nChanges++].key, key);
    } else if (sscanf(line, "point %lf %lf", &a, &b) == 2) {
      curveX[nPoints] = a;
      curveY[nPoints++] = b;
    } else if (sscanf(line, "%31s %lf", key, &a) == 2) *placeOf(key) = a;
  }
  fclose(in);
}

/* ---- line: straight segments, their integral, the mean over the rounding time ---- */
static double segAt[2 * MOST + 1], segV[2 * MOST + 1], segSlope[2 * MOST + 1], segWay[2 * MOST + 1];
static int nSegs;

static void pushSegment(double at, double v, double slope) {
  double way = 0;
  if (nSegs > 0) {
    double t = at - segAt[nSegs - 1];
    way = segWay[nSegs - 1] + t * (segV[nSegs - 1] + 0.5 * segSlope[nSegs - 1] * t);
  }
  segAt[nSegs] = at; segV[nSegs] = v; segSlope[nSegs] = slope; segWay[nSegs++] = way;
}
static int segmentAt(double t) {
  int i = nSegs - 1;
  while (i > 0 && segAt[i] > t) i--;
  return i;
}
static double straightV(double t) {
  int i = segmentAt(t);
  return segV[i] + segSlope[i] * (t - segAt[i]);
}
static double way(double t) {
  int i = segmentAt(t);
  double s = t - segAt[i];
  return segWay[i] + s * (segV[i] + 0.5 * segSlope[i] * s);
}
static double lineV(double t) {
  return d.lineRoundS > 0 ? (way(t) - way(t - d.lineRoundS)) / d.lineRoundS : straightV(t);
}
static double lineSlope(double t) {
  return d.lineRoundS > 0 ? (straightV(t) - straightV(t - d.lineRoundS)) / d.lineRoundS : segSlope[segmentAt(t)];
}
static void command(double t, const Command *c) {
  double now = straightV(t);
  while (nSegs > 1 && segAt[nSegs - 1] >= t) nSegs--; /* what was planned beyond is forgotten */
  if (c->ramp > 0) {
    pushSegment(t, now, (c->speed - now) / c->ramp);
    pushSegment(t + c->ramp, c->speed, 0);
  } else pushSegment(t, c->speed, 0);
}

/* ---- noise: xoshiro128** and the normal quantile AS 241 ---- */
static unsigned word[4];
static unsigned rotl(unsigned x, int k) { return (x << k) | (x >> (32 - k)); }
static unsigned nextWord(void) {
  unsigned result = rotl(word[1] * 5, 7) * 9, t = word[1] << 9;
  word[2] ^= word[0]; word[3] ^= word[1]; word[1] ^= word[2]; word[0] ^= word[3];
  word[2] ^= t;
  word[3] = rotl(word[3], 11);
  return result;
}
static void seedWords(unsigned seed) {
  for (int i = 0; i < 4; i++) {
    seed += 0x9e3779b9u;
    unsigned x = seed;
    x = (x ^ (x >> 16)) * 0x21f0aaadu;
    x = (x ^ (x >> 15)) * 0x735a2d97u;
    word[i] = x ^ (x >> 15);
  }
}
static double ratio(double x, const double *top, const double *bottom) {
  double a = 0, b = 0;
  for (int i = 0; i < 8; i++) { a = a * x + top[i]; b = b * x + bottom[i]; }
  return a / b;
}
static double normal(double p) {
  static const double ct[] = {2509.0809287301227, 33430.57558358813, 67265.7709270087, 45921.95393154987,
    13731.69376550946, 1971.5909503065513, 133.14166789178438, 3.3871328727963665};
  static const double cb[] = {5226.495278852546, 28729.085735721943, 39307.89580009271, 21213.794301586597,
    5394.196021424751, 687.1870074920579, 42.31333070160091, 1};
  static const double mt[] = {0.0007745450142783414, 0.022723844989269184, 0.2417807251774506, 1.2704582524523684,
    3.6478483247632045, 5.769497221460691, 4.630337846156546, 1.4234371107496835};
  static const double mb[] = {1.0507500716444169e-9, 0.0005475938084995345, 0.015198666563616457,
    0.14810397642748008, 0.6897673349851, 1.6763848301838038, 2.053191626637759, 1};
  static const double ft[] = {2.0103343992922881e-7, 0.000027115555687434876, 0.0012426609473880784,
    0.026532189526576124, 0.29656057182850487, 1.7848265399172913, 5.463784911164114, 6.657904643501103};
  static const double fb[] = {2.0442631033899397e-15, 1.421511758316446e-7, 0.000018463183175100548,
    0.0007868691311456133, 0.014875361290850615, 0.1369298809227358, 0.599832206555888, 1};
  double q = p - 0.5;
  if (fabs(q) <= 0.425) return q * ratio(0.180625 - q * q, ct, cb);
  double r = sqrt(-log(q < 0 ? p : 1 - p));
  double x = r <= 5 ? ratio(r - 1.6, mt, mb) : ratio(r - 5, ft, fb);
  return q < 0 ? -x : x;
}

/* ---- plant ---- */
static double EA, eps1, wanted, loading, tensionNow, pull, drag, hold;
static int sliding, stopped; /* direction of sliding, 0 held; dancer -1, 1 at a stop */

static double curve(double x) {
  int i = nPoints - 1;
  while (i > 0 && x < curveX[i]) i--;
  if (i == nPoints - 1) return curveY[i];
  return curveY[i] + (curveY[i + 1] - curveY[i]) / (curveX[i + 1] - curveX[i]) * (x - curveX[i]);
}
static double inertia(double r) {
  return d.coreInertiaKgM2 + 0.5 * M_PI * d.densityKgM3 * d.widthM * (r * r * r * r - pow(d.coreRadiusM, 4));
}
static double meanRadius(const double *y) {
  return sqrt(d.coreRadiusM * d.coreRadiusM + d.thicknessM * y[WOUND] / M_PI);
}
static double brakeTorque(const double *y) {
  double fade = 1 - d.fadePerK * fmax(0, y[HEAT] - d.fadeStartC);
  return fmax(0.3, fade) * (d.residualTorqueNm + (d.maxTorqueNm - d.residualTorqueNm) * curve(y[DRIVE]));
}
static double grip(double omega) {
  double z = omega / d.breakawayRadps;
  return 1 + (d.breakaway - 1) / (1 + z * z);
}

static void slopes(double t, const double *y, double *k) {
  double v = lineV(t);
  double r = meanRadius(y);
  double re = r;
  if (d.eccentricityM != 0 || d.ovalM != 0) re += d.eccentricityM * cos(y[THETA]) + d.ovalM * cos(2 * y[THETA]);
  double path = d.lengthM + (d.isDancer ? 2 * y[DANCER] : 0);
  double pathSlope = d.isDancer && !stopped ? 2 * y[SPEED] : 0;
  double eps = path / y[LENGTH] - 1;
  double paid = y[OMEGA] * re / (1 + eps1);
  double lengthSlope = paid - v / (1 + fmax(eps, 0));
  double tension = 0, atRoll = 0;
  if (eps > 0) {
    double epsSlope = pathSlope / y[LENGTH] - path / (y[LENGTH] * y[LENGTH]) * lengthSlope;
    tension = fmax(0, EA * (eps + d.lossTimeS * epsSlope));
    double lost = d.idlerDragN * fmin(1, fmax(v, 0) / 0.02);
    if (d.idlerMassKg != 0) lost += d.idlerMassKg * lineSlope(t);
    atRoll = fmax(0, tension - lost);
  }
  pull = atRoll * re;
  double torque = brakeTorque(y) * grip(y[OMEGA]);
  drag = torque + d.coulombNm;
  k[OMEGA] = sliding ? (pull - d.viscousNmS * y[OMEGA] - drag * sliding) / inertia(r) : 0;
  k[THETA] = y[OMEGA];
  k[WOUND] = -paid;
  k[LENGTH] = lengthSlope;
  k[HEAT] = (torque * fabs(y[OMEGA]) - d.conductanceWPerK * (y[HEAT] - d.ambientC)) / d.capacityJPerK;
  k[DRIVE] = d.lagS > 0 ? (wanted - y[DRIVE]) / d.lagS : 0;
  if (d.isDancer) {
    hold = 2 * loading - 2 * tension;
    k[FILTER] = 0;
    k[DANCER] = stopped ? 0 : y[SPEED];
    k[SPEED] = stopped ? 0 : (hold - d.dampingNsPerM * y[SPEED]) / d.massKg;
  } else {
    k[FILTER] = d.filterS > 0 ? (d.zeroN + d.spanPct / 100 * tension - y[FILTER]) / d.filterS : 0;
    k[DANCER] = k[SPEED] = 0;
  }
  tensionNow = tension;
}

/* Held or sliding, dancer free or at a stop; leaves tension, pull and drag of this state. */
static void settle(double t, double *y) {
  double k[STATES];
  if (d.isDancer) {
    if (y[DANCER] <= 0 && y[SPEED] <= 0) { y[DANCER] = 0; stopped = -1; }
    else if (y[DANCER] >= d.travelM && y[SPEED] >= 0) { y[DANCER] = d.travelM; stopped = 1; }
    else stopped = 0;
    if (stopped) y[SPEED] = 0;
  }
  sliding = (y[OMEGA] > 0) - (y[OMEGA] < 0);
  slopes(t, y, k);
  if (stopped && hold * stopped < 0) { stopped = 0; slopes(t, y, k); }
  if (y[OMEGA] == 0 && fabs(pull) > drag) { sliding = pull > 0 ? 1 : -1; }
}

static void step(double t, double h, double *y) {
  double k1[STATES], k2[STATES], k3[STATES], k4[STATES], z[STATES];
  slopes(t, y, k1);
  for (int i = 0; i < STATES; i++) z[i] = y[i] + h / 2 * k1[i];
  slopes(t + h / 2, z, k2);
  for (int i = 0; i < STATES; i++) z[i] = y[i] + h / 2 * k2[i];
  slopes(t + h / 2, z, k3);
  for (int i = 0; i < STATES; i++) z[i] = y[i] + h * k3[i];
  slopes(t + h, z, k4);
  double before = y[OMEGA];
  for (int i = 0; i < STATES; i++) y[i] += h / 6 * (k1[i] + 2 * (k2[i] + k3[i]) + k4[i]);
  if (before * y[OMEGA] < 0 || (sliding && sliding * y[OMEGA] < 0)) y[OMEGA] = 0;
}

/* ---- one run; rows are printed, kept or neither ---- */
static double run(int printRows, double *kept) {
  double y[STATES] = {0};
  double ts = d.sampleS, h = d.plantStepS;
  long ticks = (long)floor(d.durationS / ts + 1e-6), perTick = lround(ts / h), delay = (long)floor(d.deadTimeS / h + 0.5);
  double *queue = malloc((size_t)(delay + 1) * sizeof *queue);
  struct Document original = d; /* a run changes settings */
  nSegs = 0;
  pushSegment(-1e9, 0, 0);
  segAt[0] = -1e3;
  seedWords((unsigned)d.seed);
  EA = d.modulusPa * d.widthM * d.thicknessM;
  eps1 = d.woundTensionN / EA;
  y[WOUND] = M_PI * (d.radiusM * d.radiusM - d.coreRadiusM * d.coreRadiusM) / d.thicknessM;
  y[HEAT] = d.ambientC;
  y[DRIVE] = d.standstillPct;
  y[DANCER] = d.travelM / 2;
  y[LENGTH] = (d.lengthM + (d.isDancer ? 2 * y[DANCER] : 0)) / (1 + d.initialTensionN / EA);
  y[FILTER] = d.isDancer ? 0 : d.zeroN + d.spanPct / 100 * d.initialTensionN;
  for (long i = 0; i <= delay; i++) queue[i] = d.standstillPct;

  int phase = STANDSTILL, closed = 0, ramping = 0, hasInput = 0, ever = 0, nextCommand = 0, nextChange = 0;
  double input = 0, integral = 0, der = 0, lastY = 0, setPoint = d.setPointN, u = d.standstillPct, w = u, stuck = u;
  double runAt = 0, rampAt = 0, stopAt = 0, stopOut = 0, target = 0, rampEnd = 0, tension = d.initialTensionN;
  long plantStep = 0;
  for (long tick = 0; tick <= ticks; tick++) {
    double t = (double)tick * ts;
    if (printRows && tick % lround(0.1 / ts) == 0) printf("%.9g,%.9g\n", t, tension);
    if (kept) {
      double *row = kept + 12 * tick;
      row[0] = tension; row[1] = y[FILTER]; row[3] = u; row[4] = lineV(t); row[5] = y[OMEGA];
      row[6] = meanRadius(y); row[7] = fmax(0, y[LENGTH] - d.lengthM - 2 * y[DANCER]);
      row[8] = brakeTorque(y) * grip(y[OMEGA]); row[9] = y[HEAT]; row[10] = y[DANCER];
    }
    if (tick == ticks) break;
    int ran = 0, halted = 0;
    for (; nextCommand < nCommands && commands[nextCommand].at <= t + 1e-9; nextCommand++) {
      const Command *c = &commands[nextCommand];
      command(t, c);
      target = c->speed;
      rampEnd = t + c->ramp;
      if (c->kind == 0) { ran = ever = 1; halted = 0; } else if (!halted) halted = 1;
    }
    for (; nextChange < nChanges && changes[nextChange].at <= t + 1e-9; nextChange++)
      *placeOf(changes[nextChange].key) = changes[nextChange].value;
    int stands = !ran && (!ever || (target == 0 && t >= rampEnd + d.lineRoundS - 1e-9));

    /* sample and input */
    if (!d.isDancer) {
      double draw = d.noiseN > 0 ? normal((nextWord() + 0.5) / 4294967296.0) : (nextWord(), 0);
      double sample = fmin(fmax(y[FILTER] + d.noiseN * draw, -0.1 * d.rangeN), 1.2 * d.rangeN);
      double raw = d.inputSign * (sample - d.zeroAdjustN) * d.spanAdjustPct / 100;
      input = d.inputFilterS > 0 && hasInput ? input + ts / (ts + d.inputFilterS) * (raw - input) : raw;
      hasInput = 1;
    }

    /* phase and set point */
    int hasStart = d.startOutputPct >= 0;
    if (ran) {
      if (phase == STOPPING) phase = RUNNING;
      if (phase == STANDSTILL) {
        phase = d.startRampS == 0 && !hasStart ? RUNNING : STARTING;
        runAt = rampAt = t;
        ramping = !hasStart;
      }
    }
    if (halted && (phase == STARTING || phase == RUNNING)) { phase = STOPPING; stopAt = t; stopOut = u; }
    if (phase == STARTING && !ramping &&
        (!hasStart || (!d.isDancer && input > d.closeAboveN) || t - runAt >= d.startHoldS - 1e-9)) { ramping = 1; rampAt = t; }
    if (phase == STARTING && ramping && t - rampAt >= d.startRampS - 1e-9) phase = RUNNING;
    int holds = t - stopAt < d.stopHoldS - 1e-9;
    if (stands && (phase == RUNNING || (phase == STOPPING && !holds))) phase = STANDSTILL;
    if (phase == STARTING) {
      double share = ramping ? (t - rampAt) / d.startRampS : 0;
      setPoint = d.setPointN * (d.startFraction + (1 - d.startFraction) * share);
    } else if (d.setPointRateNps > 0) {
      double most = d.setPointRateNps * ts;
      setPoint += fmin(fmax(d.setPointN - setPoint, -most), most);
    } else setPoint = d.setPointN;

    /* output */
    double rc = meanRadius(y);
    int pid = phase == RUNNING || (phase == STARTING && ramping) || (phase == STOPPING && d.stopHoldS == 0);
    if (pid) {
      double sense = d.isDancer ? -1 : 1;
      double yy = d.isDancer ? 100 * y[DANCER] / d.travelM : 100 * input / d.rangeN;
      double r = d.isDancer ? 50 : 100 * setPoint / d.rangeN;
      double slope = lineSlope(t), assist = 0, comp = d.radiusCompensation ? rc / d.radiusRefM : 1;
      if (d.inertiaAssistPct > 0 && slope < 0)
        assist = d.inertiaAssistPct * (inertia(rc) * -slope / rc) / (d.maxTorqueNm - d.residualTorqueNm);
      double p = sense * d.kp * (d.setPointWeight * r - yy);
      if (!closed) { lastY = yy; der = 0; integral = (u - assist) / comp - p; closed = 1; }
      if (d.tdS > 0) {
        double tf = d.tdS / d.derivativeN;
        der = (tf * der + (yy - lastY)) / (tf + ts);
      } else der = 0;
      lastY = yy;
      double c = comp * (p + integral - sense * d.kp * d.tdS * der) + assist;
      u = fmin(fmax(c, d.outMinPct), d.outMaxPct);
      double e = sense * (r - yy);
      int stuckAt = (c >= d.outMaxPct && e > 0) || (c <= d.outMinPct && e < 0);
      if (d.tiS > 0 && !stuckAt) integral += d.kp * ts / d.tiS * e;
    } else {
      closed = 0;
      if (phase == STARTING) u = fmin(fmax(d.startOutputPct, d.outMinPct), d.outMaxPct);
      else if (phase == STOPPING && holds) u = fmin(fmax(stopOut * d.stopHoldGain, d.outMinPct), d.outMaxPct);
      else u = d.standstillPct;
    }
    if (kept) { kept[12 * tick + 2] = setPoint; kept[12 * tick + 11] = phase; }

    /* play, stick, delay, plant */
    w = fmin(fmax(w, u - d.playPct / 2), u + d.playPct / 2);
    if (tick == 0 || fabs(w - stuck) > d.stickPct) stuck = w;
    loading = setPoint;
    for (long i = 0; i < perTick; i++, plantStep++) {
      queue[plantStep % (delay + 1)] = stuck;
      wanted = queue[(plantStep + 1) % (delay + 1)];
      if (d.lagS == 0) y[DRIVE] = wanted;
      double from = t + (double)i * h;
      settle(from, y);
      if (tensionNow > d.breakNPerM * d.widthM || y[WOUND] <= 0) goto over;
      step(from, h, y);
    }
    settle(t + ts, y);
    tension = tensionNow;
    if (tension > d.breakNPerM * d.widthM || y[WOUND] <= 0) goto over;
    if (!d.isDancer && d.filterS == 0) y[FILTER] = d.zeroN + d.spanPct / 100 * tension;
  }
over:
  free(queue);
  d = original;
  return tension + y[OMEGA] + y[HEAT] + u;
}

int main(int argc, char **argv) {
  if (argc < 3) { fprintf(stderr, "plain FILE rows|time N|keep N\n"); return 2; }
  readDocument(argv[1]);
  if (strcmp(argv[2], "rows") == 0) { run(1, NULL); return 0; }
  long times = argc > 3 ? atol(argv[3]) : 1;
  double *kept = strcmp(argv[2], "keep") == 0 ? malloc(12 * sizeof(double) * (size_t)(d.durationS / d.sampleS + 2)) : NULL;
  double sum = 0;
  for (long i = 0; i < times; i++) {
    struct timespec a, b;
    clock_gettime(CLOCK_MONOTONIC, &a);
    sum += run(0, kept);
    clock_gettime(CLOCK_MONOTONIC, &b);
    printf("%.9f\n", (double)(b.tv_sec - a.tv_sec) + 1e-9 * (double)(b.tv_nsec - a.tv_nsec));
  }
  fprintf(stderr, "%.17g\n", sum);
  return 0;
}
