/*
 * The unwind stand of sim-core/PHYSICS.md as a plain C program: what one writes down from the equations.
 * Classical Runge-Kutta steps of the fourth order, one for each plant step; the brake that holds and the
 * dancer at a stop are explicit states, tested at the start of each step. It is what the engine is
 * measured against, so it is neither tuned nor slowed down.
 *
 *   plain DOCUMENT rows EVERY_S     the table, one row each EVERY_S seconds
 *   plain DOCUMENT time RUNS [keep] of each of RUNS runs the nanoseconds by the clock and of the processor,
 *                                   the ticks, and a sum over its end; `keep` stores a row of twelve
 *                                   numbers in each control tick, as the engine does when asked to
 *
 * DOCUMENT is the flat text that document-text.ts writes. Left out is what no reference case uses: manual
 * mode, gain by radius, other sources of the radius than the true one, other anti-windup than conditional, a
 * roller with run-out, disturbances. The writer refuses a document that needs one of them.
 */
#include <math.h>
#include <stdbool.h>
#include <stdint.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <time.h>

#define PI 3.14159265358979323846
#define GRACE 1e-9 /* a time counts as come within this [s] */
#define MAX_POINTS 64
#define MAX_LINE 64
#define MAX_ACTIONS 256

/* ---- The document, SI units, percent values 0...100 ---- */

enum Command { RUN, STOP, FAST_STOP };

struct LineCommand {
  double at, speed, ramp;
  enum Command command;
};

struct Action {
  double at;
  double *target; /* the setting it replaces */
  double value;
};

static struct Document {
  double duration, seed, initial_tension, line_round, plant_step;
  double width, thickness, modulus, density, break_per_m, loss_time;
  double core_radius, radius, core_inertia, wound_tension, eccentricity, oval, coulomb, viscous;
  double span, idler_drag, idler_mass;
  double max_torque, residual, lag, dead_time, play, stick, breakaway, breakaway_speed;
  double capacity, conductance, ambient, fade_per_k, fade_start;
  double is_dancer, range, filter, noise, zero, span_pct, travel, mass, damping;
  double sample, kp, ti, td, derivative_n, weight, out_min, out_max, set_point;
  double start_ramp, start_fraction, standstill, stop_hold, stop_gain, fast_hold, fast_gain;
  double radius_compensation, radius_ref, inertia_assist, set_point_rate;
  double start_output, close_above, start_hold; /* start_output < 0: none */
  double zero_adjust, span_adjust, input_sign, input_filter;
  double curve_x[MAX_POINTS], curve_y[MAX_POINTS];
  int curve_points;
  struct LineCommand line[MAX_LINE];
  int lines;
  struct Action actions[MAX_ACTIONS];
  int actions_count;
} doc, as_read; /* as_read: the settings before any action */

static const struct Key {
  const char *name;
  double *value;
} keys[] = {
    {"durationS", &doc.duration},
    {"seed", &doc.seed},
    {"initialTensionN", &doc.initial_tension},
    {"lineRoundS", &doc.line_round},
    {"plantStepS", &doc.plant_step},
    {"web.widthM", &doc.width},
    {"web.thicknessM", &doc.thickness},
    {"web.modulusPa", &doc.modulus},
    {"web.densityKgM3", &doc.density},
    {"web.breakNPerM", &doc.break_per_m},
    {"web.lossTimeS", &doc.loss_time},
    {"roll.coreRadiusM", &doc.core_radius},
    {"roll.radiusM", &doc.radius},
    {"roll.coreInertiaKgM2", &doc.core_inertia},
    {"roll.woundTensionN", &doc.wound_tension},
    {"roll.eccentricityM", &doc.eccentricity},
    {"roll.ovalM", &doc.oval},
    {"roll.coulombNm", &doc.coulomb},
    {"roll.viscousNmS", &doc.viscous},
    {"span.lengthM", &doc.span},
    {"span.idlerDragN", &doc.idler_drag},
    {"span.idlerMassKg", &doc.idler_mass},
    {"brake.maxTorqueNm", &doc.max_torque},
    {"brake.residualTorqueNm", &doc.residual},
    {"brake.lagS", &doc.lag},
    {"brake.deadTimeS", &doc.dead_time},
    {"brake.playPct", &doc.play},
    {"brake.stickPct", &doc.stick},
    {"brake.breakaway", &doc.breakaway},
    {"brake.breakawayRadps", &doc.breakaway_speed},
    {"brake.capacityJPerK", &doc.capacity},
    {"brake.conductanceWPerK", &doc.conductance},
    {"brake.ambientC", &doc.ambient},
    {"brake.fadePerK", &doc.fade_per_k},
    {"brake.fadeStartC", &doc.fade_start},
    {"sensing.isDancer", &doc.is_dancer},
    {"sensing.rangeN", &doc.range},
    {"sensing.filterS", &doc.filter},
    {"sensing.noiseN", &doc.noise},
    {"sensing.zeroN", &doc.zero},
    {"sensing.spanPct", &doc.span_pct},
    {"sensing.travelM", &doc.travel},
    {"sensing.massKg", &doc.mass},
    {"sensing.dampingNsPerM", &doc.damping},
    {"controller.sampleS", &doc.sample},
    {"controller.kp", &doc.kp},
    {"controller.tiS", &doc.ti},
    {"controller.tdS", &doc.td},
    {"controller.derivativeN", &doc.derivative_n},
    {"controller.setPointWeight", &doc.weight},
    {"controller.outMinPct", &doc.out_min},
    {"controller.outMaxPct", &doc.out_max},
    {"controller.setPointN", &doc.set_point},
    {"controller.startRampS", &doc.start_ramp},
    {"controller.startFraction", &doc.start_fraction},
    {"controller.standstillPct", &doc.standstill},
    {"controller.stopHoldS", &doc.stop_hold},
    {"controller.stopHoldGain", &doc.stop_gain},
    {"controller.fastStopHoldS", &doc.fast_hold},
    {"controller.fastStopGain", &doc.fast_gain},
    {"controller.radiusCompensation", &doc.radius_compensation},
    {"controller.radiusRefM", &doc.radius_ref},
    {"controller.inertiaAssistPct", &doc.inertia_assist},
    {"controller.setPointRateNps", &doc.set_point_rate},
    {"controller.startOutputPct", &doc.start_output},
    {"controller.closeAboveN", &doc.close_above},
    {"controller.startHoldS", &doc.start_hold},
    {"controller.zeroAdjustN", &doc.zero_adjust},
    {"controller.spanAdjustPct", &doc.span_adjust},
    {"controller.inputSign", &doc.input_sign},
    {"controller.inputFilterS", &doc.input_filter},
};

static void fail(const char *why, const char *what)
{
  fprintf(stderr, "plain: %s %s\n", why, what);
  exit(2);
}

static double *place_of(const char *name)
{
  for (size_t i = 0; i < sizeof keys / sizeof keys[0]; i++)
    if (strcmp(keys[i].name, name) == 0) return keys[i].value;
  fail("unknown key", name);
  return NULL;
}

/* Reads lines "KEY VALUE", "curve N X Y ...", "line AT COMMAND SPEED RAMP", "set AT KEY VALUE". */
static void read_document(const char *file)
{
  FILE *in = fopen(file, "r");
  char key[128], name[128];
  if (in == NULL) fail("cannot read", file);
  doc.start_output = -1;
  while (fscanf(in, "%127s", key) == 1) {
    bool is_good = true;
    if (strcmp(key, "curve") == 0) {
      is_good = fscanf(in, "%d", &doc.curve_points) == 1 && doc.curve_points <= MAX_POINTS;
      for (int i = 0; is_good && i < doc.curve_points; i++)
        is_good = fscanf(in, "%lf %lf", &doc.curve_x[i], &doc.curve_y[i]) == 2;
    } else if (strcmp(key, "line") == 0) {
      if (doc.lines == MAX_LINE) fail("too many", "line commands");
      struct LineCommand *c = &doc.line[doc.lines++];
      is_good = fscanf(in, "%lf %127s %lf %lf", &c->at, name, &c->speed, &c->ramp) == 4;
      c->command = strcmp(name, "run") == 0 ? RUN : strcmp(name, "stop") == 0 ? STOP : FAST_STOP;
    } else if (strcmp(key, "set") == 0) {
      if (doc.actions_count == MAX_ACTIONS) fail("too many", "actions");
      struct Action *a = &doc.actions[doc.actions_count++];
      is_good = fscanf(in, "%lf %127s %lf", &a->at, name, &a->value) == 3;
      if (is_good) a->target = place_of(name);
    } else is_good = fscanf(in, "%lf", place_of(key)) == 1;
    if (!is_good) fail("cannot read the value of", key);
  }
  fclose(in);
  as_read = doc;
}

/* ---- Noise: xoshiro128** (Blackman, Vigna 2021), normal by Wichura's AS 241 (1988) ---- */

static uint32_t words[4];

static uint32_t rotate(uint32_t word, int bits)
{
  return word << bits | word >> (32 - bits);
}

static void seed_generator(uint32_t seed)
{
  for (int i = 0; i < 4; i++) {
    uint32_t word = seed += 0x9e3779b9u;
    word = (word ^ word >> 16) * 0x21f0aaadu;
    word = (word ^ word >> 15) * 0x735a2d97u;
    words[i] = word ^ word >> 15;
  }
}

static uint32_t next_word(void)
{
  uint32_t result = rotate(words[1] * 5, 7) * 9;
  uint32_t shifted = words[1] << 9;
  words[2] ^= words[0];
  words[3] ^= words[1];
  words[1] ^= words[2];
  words[0] ^= words[3];
  words[2] ^= shifted;
  words[3] = rotate(words[3], 11);
  return result;
}

/* Polynomial with eight coefficients, lowest power first. */
static double polynomial(const double c[8], double x)
{
  double sum = c[7];
  for (int i = 6; i >= 0; i--) sum = sum * x + c[i];
  return sum;
}

static double normal_quantile(double p)
{
  static const double a[8] = {3.3871328727963666080e0, 1.3314166789178437745e+2,
                              1.9715909503065514427e+3, 1.3731693765509461125e+4,
                              4.5921953931549871457e+4, 6.7265770927008700853e+4,
                              3.3430575583588128105e+4, 2.5090809287301226727e+3};
  static const double b[8] = {1.0, 4.2313330701600911252e+1, 6.8718700749205790830e+2,
                              5.3941960214247511077e+3, 2.1213794301586595867e+4,
                              3.9307895800092710610e+4, 2.8729085735721942674e+4,
                              5.2264952788528545610e+3};
  static const double c[8] = {1.42343711074968357734e0, 4.63033784615654529590e0,
                              5.76949722146069140550e0, 3.64784832476320460504e0,
                              1.27045825245236838258e0, 2.41780725177450611770e-1,
                              2.27238449892691845833e-2, 7.74545014278341407640e-4};
  static const double d[8] = {1.0, 2.05319162663775882187e0, 1.67638483018380384940e0,
                              6.89767334985100004550e-1, 1.48103976427480074590e-1,
                              1.51986665636164571966e-2, 5.47593808499534494600e-4,
                              1.05075007164441684324e-9};
  static const double e[8] = {6.65790464350110377720e0, 5.46378491116411436990e0,
                              1.78482653991729133580e0, 2.96560571828504891230e-1,
                              2.65321895265761230930e-2, 1.24266094738807843860e-3,
                              2.71155556874348757815e-5, 2.01033439929228813265e-7};
  static const double f[8] = {1.0, 5.99832206555887937690e-1, 1.36929880922735805310e-1,
                              1.48753612908506148525e-2, 7.86869131145613259100e-4,
                              1.84631831751005468180e-5, 1.42151175831644588870e-7,
                              2.04426310338993978564e-15};
  double q = p - 0.5;
  if (fabs(q) <= 0.425) {
    double r = 0.180625 - q * q;
    return q * polynomial(a, r) / polynomial(b, r);
  }
  double r = sqrt(-log(q < 0 ? p : 1 - p));
  double size = r <= 5 ? polynomial(c, r - 1.6) / polynomial(d, r - 1.6)
                       : polynomial(e, r - 5) / polynomial(f, r - 5);
  return q < 0 ? -size : size;
}

static double next_normal(void)
{
  return normal_quantile((next_word() + 0.5) / 4294967296.0);
}

/* ---- Line speed: a straight profile of segments, rounded to its mean over the last line_round ---- */

struct Segment {
  double start, speed, slope; /* of the straight profile, from `start` on */
  double way;                 /* web run through up to `start` [m] */
};

static struct Segment segments[2 * MAX_LINE + 1];
static int segments_count;
static const struct Segment *seg_now, *seg_old; /* in force now, and line_round ago */

static double straight_speed(const struct Segment *s, double t)
{
  return s->speed + s->slope * (t - s->start);
}

static double straight_way(const struct Segment *s, double t)
{
  double since = t - s->start;
  return s->way + since * (s->speed + 0.5 * s->slope * since);
}

static void add_segment(double start, double speed, double slope)
{
  struct Segment *last = &segments[segments_count - 1];
  while (last > segments && last->start >= start - GRACE) last--, segments_count--;
  segments[segments_count++] = (struct Segment){start, speed, slope, straight_way(last, start)};
}

/* First control tick at or after a time of the document. */
static int tick_of(double at)
{
  return (int)ceil((at - GRACE) / doc.sample);
}

/* Lays out the straight profile of the whole run: the commands are all known. */
static void lay_out_line(void)
{
  segments[0] = (struct Segment){-1e6, 0, 0, 0};
  segments_count = 1;
  for (int i = 0; i < doc.lines; i++) {
    const struct LineCommand *c = &doc.line[i];
    double t = tick_of(c->at) * doc.sample;
    double target = c->command == RUN ? c->speed : 0;
    const struct Segment *s = &segments[segments_count - 1];
    while (s > segments && s->start > t + GRACE) s--;
    double speed = straight_speed(s, t);
    segments_count = (int)(s - segments) + 1; /* what was planned beyond is forgotten */
    if (c->ramp > 0) {
      add_segment(t, speed, (target - speed) / c->ramp);
      add_segment(t + c->ramp, target, 0);
    } else add_segment(t, target, 0);
  }
  seg_now = seg_old = segments;
}

/* Finds the segments in force in the step that begins at t. */
static void find_segments(double t)
{
  const struct Segment *last = &segments[segments_count - 1];
  while (seg_now < last && seg_now[1].start <= t + GRACE) seg_now++;
  while (seg_old < last && seg_old[1].start <= t - doc.line_round + GRACE) seg_old++;
}

static double line_speed(double t)
{
  if (doc.line_round == 0) return straight_speed(seg_now, t);
  double before = t - doc.line_round;
  return (straight_way(seg_now, t) - straight_way(seg_old, before)) / doc.line_round;
}

static double line_slope(double t)
{
  if (doc.line_round == 0) return seg_now->slope;
  double before = t - doc.line_round;
  return (straight_speed(seg_now, t) - straight_speed(seg_old, before)) / doc.line_round;
}

/* ---- Plant ---- */

enum { OMEGA, THETA, WOUND, LENGTH, DRIVE, HEAT, FILTER, DANCER, DANCER_SPEED, STATES };

static double y[STATES];
static int sliding; /* direction the roll turns in; 0: the brake holds it */
static int at_stop; /* dancer at its lower (-1), upper (1), no stop (0) */
static double command;     /* delayed command of the brake [%] */
static double loading;     /* tension the dancer is loaded for [N] */
static double tension;     /* of the last evaluation [N] */
static double pull, hold;  /* torque of the web on the roll, most that brake and bearings hold [N m] */
static double dancer_force;

/* What follows from the document. */
static double stiffness, wound_stretch, inertia_empty, inertia_per_r4;

static double larger(double a, double b)
{
  return a > b ? a : b;
}

static double smaller(double a, double b)
{
  return a < b ? a : b;
}

static double clamp(double value, double low, double high)
{
  return value < low ? low : value > high ? high : value;
}

static double mean_radius(double wound)
{
  return sqrt(doc.core_radius * doc.core_radius + doc.thickness * wound / PI);
}

static double inertia(double radius)
{
  double square = radius * radius;
  return inertia_empty + inertia_per_r4 * square * square;
}

static double path_length(void)
{
  return doc.is_dancer ? doc.span + 2 * y[DANCER] : doc.span;
}

static double curve_at(double x)
{
  const double *cx = doc.curve_x, *cy = doc.curve_y;
  int last = doc.curve_points - 1;
  if (x <= cx[0]) return cy[0];
  if (x >= cx[last]) return cy[last];
  int i = 1;
  while (x > cx[i]) i++;
  return cy[i - 1] + (cy[i] - cy[i - 1]) * (x - cx[i - 1]) / (cx[i] - cx[i - 1]);
}

/* Torque of the brake as it grips at this speed [N m]. */
static double brake_torque(double drive, double heat, double omega)
{
  double torque = doc.residual + (doc.max_torque - doc.residual) * curve_at(drive);
  if (doc.fade_per_k > 0 && heat > doc.fade_start)
    torque *= larger(0.3, 1 - doc.fade_per_k * (heat - doc.fade_start));
  if (doc.breakaway > 1) {
    double share = omega / doc.breakaway_speed;
    torque *= 1 + (doc.breakaway - 1) / (1 + share * share);
  }
  return torque;
}

static double cell_signal(double force)
{
  return doc.zero + doc.span_pct / 100 * force;
}

/* Slopes of the states; leaves tension, pull, hold and dancer_force of this evaluation behind. */
static void slopes(const double s[STATES], double v, double dv, double slope[STATES])
{
  double omega = s[OMEGA], length = s[LENGTH];
  double radius = mean_radius(s[WOUND]);
  double effective = radius;
  if (doc.eccentricity > 0) effective += doc.eccentricity * cos(s[THETA]);
  if (doc.oval > 0) effective += doc.oval * cos(2 * s[THETA]);

  double path = doc.span, path_slope = 0;
  if (doc.is_dancer) {
    path += 2 * s[DANCER];
    if (at_stop == 0) path_slope = 2 * s[DANCER_SPEED];
  }

  double paid_out = omega * effective / wound_stretch;
  double strain = path / length - 1;
  double length_slope = paid_out - v / (1 + larger(strain, 0));
  double at_roll = 0;
  tension = 0;
  if (strain > 0) {
    double strain_slope = path_slope / length - path / (length * length) * length_slope;
    tension = larger(0, stiffness * (strain + doc.loss_time * strain_slope));
    double idlers = doc.idler_drag * smaller(1, larger(v, 0) / 0.02) + doc.idler_mass * dv;
    at_roll = larger(0, tension - idlers);
  }

  double torque = brake_torque(s[DRIVE], s[HEAT], omega);
  pull = at_roll * effective;
  hold = torque + doc.coulomb;
  slope[OMEGA] = sliding == 0 ? 0 : (pull - doc.viscous * omega - hold * sliding) / inertia(radius);
  slope[THETA] = omega;
  slope[WOUND] = -paid_out;
  slope[LENGTH] = length_slope;
  slope[DRIVE] = doc.lag > 0 ? (command - s[DRIVE]) / doc.lag : 0;
  slope[HEAT] = (torque * fabs(omega) - doc.conductance * (s[HEAT] - doc.ambient)) / doc.capacity;
  slope[FILTER] = slope[DANCER] = slope[DANCER_SPEED] = 0;
  if (doc.is_dancer) {
    dancer_force = 2 * loading - 2 * tension;
    if (at_stop == 0) {
      slope[DANCER] = s[DANCER_SPEED];
      slope[DANCER_SPEED] = (dancer_force - doc.damping * s[DANCER_SPEED]) / doc.mass;
    }
  } else if (doc.filter > 0) slope[FILTER] = (cell_signal(tension) - s[FILTER]) / doc.filter;
}

/* Decides what holds at the start of a step, and evaluates the slopes there. */
static void settle(double v, double dv, double slope[STATES])
{
  sliding = (y[OMEGA] > 0) - (y[OMEGA] < 0);
  at_stop = 0;
  if (doc.is_dancer) {
    if (y[DANCER] <= 0 && y[DANCER_SPEED] <= 0) at_stop = -1;
    if (y[DANCER] >= doc.travel && y[DANCER_SPEED] >= 0) at_stop = 1;
    if (at_stop != 0) y[DANCER_SPEED] = 0;
  }
  slopes(y, v, dv, slope);
  bool leaves_stop = at_stop != 0 && dancer_force * at_stop < 0;
  bool breaks_loose = sliding == 0 && pull > hold;
  if (leaves_stop) at_stop = 0;
  if (breaks_loose) sliding = 1;
  if (leaves_stop || breaks_loose) slopes(y, v, dv, slope);
}

static bool is_broken(void)
{
  return tension > doc.break_per_m * doc.width;
}

/* One step from t; false when the web broke or the roll ran empty. */
static bool plant_step(double t)
{
  double h = doc.plant_step, trial[STATES];
  double k1[STATES], k2[STATES], k3[STATES], k4[STATES];
  find_segments(t);
  double v_start = line_speed(t), v_middle = line_speed(t + h / 2), v_end = line_speed(t + h);
  double a_start = 0, a_middle = 0, a_end = 0; /* the line's slope, felt by heavy idlers alone */
  if (doc.idler_mass > 0) {
    a_start = line_slope(t);
    a_middle = line_slope(t + h / 2);
    a_end = line_slope(t + h);
  }
  if (doc.lag == 0) y[DRIVE] = command;

  settle(v_start, a_start, k1);
  if (is_broken()) return false;
  for (int i = 0; i < STATES; i++) trial[i] = y[i] + h / 2 * k1[i];
  slopes(trial, v_middle, a_middle, k2);
  for (int i = 0; i < STATES; i++) trial[i] = y[i] + h / 2 * k2[i];
  slopes(trial, v_middle, a_middle, k3);
  for (int i = 0; i < STATES; i++) trial[i] = y[i] + h * k3[i];
  slopes(trial, v_end, a_end, k4);
  for (int i = 0; i < STATES; i++) y[i] += h / 6 * (k1[i] + 2 * k2[i] + 2 * k3[i] + k4[i]);

  if (y[OMEGA] * sliding < 0) y[OMEGA] = 0;
  if (doc.is_dancer && (y[DANCER] < 0 || y[DANCER] > doc.travel)) {
    y[DANCER] = clamp(y[DANCER], 0, doc.travel);
    y[DANCER_SPEED] = 0;
  }
  return y[WOUND] > 0;
}

static void reset_plant(void)
{
  double r4 = pow(doc.core_radius, 4);
  stiffness = doc.modulus * doc.width * doc.thickness;
  wound_stretch = 1 + doc.wound_tension / stiffness;
  inertia_per_r4 = 0.5 * PI * doc.density * doc.width;
  inertia_empty = doc.core_inertia - inertia_per_r4 * r4;
  memset(y, 0, sizeof y);
  y[WOUND] = (pow(doc.radius, 2) - pow(doc.core_radius, 2)) * PI / doc.thickness;
  y[DANCER] = doc.travel / 2;
  y[LENGTH] = path_length() / (1 + doc.initial_tension / stiffness);
  y[DRIVE] = doc.standstill;
  y[HEAT] = doc.ambient;
  y[FILTER] = doc.is_dancer ? 0 : cell_signal(doc.initial_tension);
  tension = doc.initial_tension;
  loading = doc.set_point;
  sliding = at_stop = 0;
}

/* ---- Drive of the brake: play, stick, dead time ---- */

static double *delayed; /* commands of the last plant steps, a ring */
static int delay_steps, delay_place;
static double after_play, after_stick;
static bool has_stick;

static void reset_drive(void)
{
  delay_steps = (int)floor(doc.dead_time / doc.plant_step + 0.5);
  free(delayed);
  delayed = malloc((delay_steps + 1) * sizeof *delayed);
  for (int i = 0; i <= delay_steps; i++) delayed[i] = doc.standstill;
  delay_place = 0;
  after_play = after_stick = doc.standstill;
  has_stick = false;
}

static void take_output(double output)
{
  after_play = clamp(after_play, output - doc.play / 2, output + doc.play / 2);
  if (!has_stick || fabs(after_play - after_stick) > doc.stick) after_stick = after_play;
  has_stick = true;
}

/* Command that reaches the brake in the next plant step. */
static double delayed_command(void)
{
  delayed[delay_place] = after_stick;
  if (++delay_place > delay_steps) delay_place = 0;
  return delayed[delay_place];
}

/* ---- Controller ---- */

enum Phase { STANDSTILL, STARTING, RUNNING, STOPPING };
static const char *const phase_names[] = {"standstill", "starting", "running", "stopping"};

static enum Phase phase;
static double output, set_point_now, integral, derivative, last_y, input;
static bool has_input, is_closed, is_ramping, stop_is_fast;
static int run_tick, ramp_tick, stop_tick, next_line, next_action;
static double output_at_stop;
static double line_target, line_ramp_end;
static bool has_run, ran, stopped; /* ran, stopped: a command of this tick */
static bool stop_of_tick_is_fast;

static void reset_controller(void)
{
  phase = STANDSTILL;
  output = doc.standstill;
  set_point_now = doc.set_point;
  integral = derivative = last_y = input = 0;
  has_input = is_closed = is_ramping = stop_is_fast = has_run = false;
  run_tick = ramp_tick = stop_tick = next_line = next_action = 0;
  line_target = line_ramp_end = 0;
}

static bool has_passed(int since, int tick, double time)
{
  return (tick - since) * doc.sample >= time - GRACE;
}

static double hold_time(void)
{
  return stop_is_fast ? doc.fast_hold : doc.stop_hold;
}

static void take_due(int tick)
{
  ran = stopped = false;
  while (next_line < doc.lines && tick_of(doc.line[next_line].at) <= tick) {
    const struct LineCommand *c = &doc.line[next_line++];
    line_target = c->command == RUN ? c->speed : 0;
    line_ramp_end = tick * doc.sample + c->ramp;
    if (c->command == RUN) {
      ran = has_run = true;
      stopped = false;
    } else if (!stopped) {
      stopped = true;
      stop_of_tick_is_fast = c->command == FAST_STOP;
    }
  }
  while (next_action < doc.actions_count && tick_of(doc.actions[next_action].at) <= tick) {
    const struct Action *a = &doc.actions[next_action++];
    *a->target = a->value;
  }
}

static bool line_stands(int tick)
{
  if (ran) return false;
  if (!has_run) return true;
  return line_target == 0 && tick * doc.sample >= line_ramp_end + doc.line_round - GRACE;
}

static void read_input(void)
{
  double sample = clamp(y[FILTER] + doc.noise * next_normal(), -0.1 * doc.range, 1.2 * doc.range);
  double fresh = doc.input_sign * (sample - doc.zero_adjust) * doc.span_adjust / 100;
  if (doc.input_filter > 0 && has_input)
    input += doc.sample / (doc.sample + doc.input_filter) * (fresh - input);
  else input = fresh;
  has_input = true;
}

static void next_phase(int tick)
{
  bool stands = line_stands(tick);
  bool has_start_output = doc.start_output >= 0;
  if (ran && phase == STOPPING) phase = RUNNING;
  if (ran && phase == STANDSTILL) {
    phase = doc.start_ramp == 0 && !has_start_output ? RUNNING : STARTING;
    run_tick = ramp_tick = tick;
    is_ramping = !has_start_output;
  }
  if (stopped && (phase == STARTING || phase == RUNNING)) {
    phase = STOPPING;
    stop_tick = tick;
    stop_is_fast = stop_of_tick_is_fast;
    output_at_stop = output;
  }
  if (phase == STARTING && !is_ramping) {
    bool is_taut = !doc.is_dancer && input > doc.close_above;
    if (!has_start_output || is_taut || has_passed(run_tick, tick, doc.start_hold)) {
      is_ramping = true;
      ramp_tick = tick;
    }
  }
  if (phase == STARTING && is_ramping && has_passed(ramp_tick, tick, doc.start_ramp))
    phase = RUNNING;
  if (stands && phase == RUNNING) phase = STANDSTILL;
  if (stands && phase == STOPPING && has_passed(stop_tick, tick, hold_time())) phase = STANDSTILL;
}

static void move_set_point(int tick)
{
  double target = doc.set_point;
  if (phase == STARTING) {
    double share = is_ramping ? (tick - ramp_tick) * doc.sample / doc.start_ramp : 0;
    set_point_now = target * (doc.start_fraction + (1 - doc.start_fraction) * share);
  } else if (doc.set_point_rate > 0) {
    double most = doc.set_point_rate * doc.sample;
    set_point_now += clamp(target - set_point_now, -most, most);
  } else set_point_now = target;
}

/* Output that brakes the roll's own inertia while the line slows down [%]. */
static double inertia_assist(double radius, double dv)
{
  if (doc.inertia_assist == 0 || dv >= 0) return 0;
  return doc.inertia_assist * (inertia(radius) * -dv / radius) / (doc.max_torque - doc.residual);
}

static double pid(double dv)
{
  double radius = mean_radius(y[WOUND]);
  double sign = doc.is_dancer ? -1 : 1; /* a dancer that rises asks for more brake */
  double now = doc.is_dancer ? 100 * y[DANCER] / doc.travel : 100 * input / doc.range;
  double wanted = doc.is_dancer ? 50 : 100 * set_point_now / doc.range;
  double compensation = doc.radius_compensation ? radius / doc.radius_ref : 1;
  double assist = inertia_assist(radius, dv);
  double error = sign * (wanted - now);
  double proportional = sign * doc.kp * (doc.weight * wanted - now);

  if (!is_closed) { /* bumpless: go on from the output in force */
    last_y = now;
    derivative = 0;
    integral = (output - assist) / compensation - proportional;
    is_closed = true;
  }
  if (doc.td > 0) {
    double filter = doc.td / doc.derivative_n;
    derivative = (filter * derivative + now - last_y) / (filter + doc.sample);
  } else derivative = 0;
  last_y = now;

  double asked = proportional + integral - sign * doc.kp * doc.td * derivative;
  asked = asked * compensation + assist;
  bool is_at_limit = (asked >= doc.out_max && error > 0) || (asked <= doc.out_min && error < 0);
  if (doc.ti > 0 && !is_at_limit) integral += doc.kp * doc.sample / doc.ti * error;
  return clamp(asked, doc.out_min, doc.out_max);
}

static void control(int tick)
{
  double t = tick * doc.sample, ignored[STATES];
  take_due(tick);
  find_segments(t);
  if (!doc.is_dancer) {
    if (doc.filter == 0) { /* the sample is the signal of this very moment */
      settle(line_speed(t), line_slope(t), ignored);
      y[FILTER] = cell_signal(tension);
    }
    read_input();
  }
  next_phase(tick);
  move_set_point(tick);
  bool holds = phase == STOPPING && hold_time() > 0;
  if (phase == RUNNING || (phase == STARTING && is_ramping) || (phase == STOPPING && !holds))
    output = pid(line_slope(t));
  else {
    is_closed = false;
    if (phase == STARTING) output = clamp(doc.start_output, doc.out_min, doc.out_max);
    else if (holds && !has_passed(stop_tick, tick, hold_time()))
      output = clamp(output_at_stop * (stop_is_fast ? doc.fast_gain : doc.stop_gain), doc.out_min,
                     doc.out_max);
    else output = doc.standstill;
  }
  loading = set_point_now;
  take_output(output);
}

/* ---- One run ---- */

enum {
  R_TENSION, R_MEASURED, R_SET_POINT, R_OUTPUT, R_LINE, R_ROLL, R_RADIUS, R_SLACK, R_TORQUE, R_HEAT,
  R_DANCER, R_PHASE, COLUMNS
};

/* The plant's part of a row, before the tick's commands; false when the web has broken. */
static bool write_plant(double row[COLUMNS], double t)
{
  double ignored[STATES];
  settle(line_speed(t), line_slope(t), ignored);
  if (is_broken()) return false;
  row[R_TENSION] = tension;
  row[R_MEASURED] = doc.filter == 0 && !doc.is_dancer ? cell_signal(tension) : y[FILTER];
  row[R_OUTPUT] = output;
  row[R_LINE] = line_speed(t);
  row[R_ROLL] = y[OMEGA];
  row[R_RADIUS] = mean_radius(y[WOUND]);
  row[R_SLACK] = larger(0, y[LENGTH] - path_length());
  row[R_TORQUE] = brake_torque(y[DRIVE], y[HEAT], y[OMEGA]);
  row[R_HEAT] = y[HEAT];
  row[R_DANCER] = doc.is_dancer ? y[DANCER] : 0;
  return true;
}

/* Runs `ticks` control ticks, a row each into `rows` unless it is NULL; returns the rows or ticks done. */
static int run(int ticks, double *rows)
{
  int steps = (int)floor(doc.sample / doc.plant_step + 0.5);
  doc = as_read;
  seed_generator((uint32_t)doc.seed);
  lay_out_line();
  reset_plant();
  reset_drive();
  reset_controller();
  for (int tick = 0; tick < ticks; tick++) {
    double *row = rows == NULL ? NULL : rows + (size_t)tick * COLUMNS;
    if (row != NULL && !write_plant(row, tick * doc.sample)) return tick;
    control(tick);
    if (row != NULL) {
      row[R_SET_POINT] = set_point_now;
      row[R_PHASE] = phase;
    }
    for (int step = 0; step < steps; step++) {
      command = delayed_command();
      if (!plant_step((tick * steps + step) * doc.plant_step)) return tick + 1;
    }
  }
  return ticks;
}

static void print_rows(const double *rows, int count, int every)
{
  printf("t_s,tension_N,measured_N,setpoint_N,output_pct,line_mps,roll_radps,radius_m,slack_m,"
         "torque_Nm,brake_C,dancer_m,phase\n");
  for (int i = 0; i < count; i += every) {
    const double *row = rows + (size_t)i * COLUMNS;
    printf("%.9g", i * doc.sample);
    for (int column = 0; column < R_PHASE; column++) printf(",%.9g", row[column]);
    printf(",%s\n", phase_names[(int)row[R_PHASE]]);
  }
}

static double now_ns(clockid_t clock)
{
  struct timespec t;
  clock_gettime(clock, &t);
  return t.tv_sec * 1e9 + t.tv_nsec;
}

int main(int argc, char **argv)
{
  if (argc < 4) fail("usage:", "plain DOCUMENT rows EVERY_S | plain DOCUMENT time RUNS [keep]");
  read_document(argv[1]);
  int ticks = (int)floor(doc.duration / doc.sample + 1e-6);
  bool wants_rows = strcmp(argv[2], "rows") == 0;
  double *rows = NULL;
  if (wants_rows || argc > 4) rows = malloc((size_t)(ticks + 1) * COLUMNS * sizeof *rows);
  if (wants_rows) {
    int count = run(ticks + 1, rows);
    print_rows(rows, count, (int)floor(atof(argv[3]) / doc.sample + 0.5));
  } else
    for (int i = 0; i < atoi(argv[3]); i++) {
      double from = now_ns(CLOCK_MONOTONIC), cpu_from = now_ns(CLOCK_PROCESS_CPUTIME_ID);
      int done = run(ticks, rows);
      double cpu_took = now_ns(CLOCK_PROCESS_CPUTIME_ID) - cpu_from;
      double took = now_ns(CLOCK_MONOTONIC) - from;
      double sum = y[OMEGA] + y[WOUND] + y[HEAT] + output;
      printf("%.0f %.0f %d %.12g\n", took, cpu_took, done, sum);
    }
  free(rows);
  free(delayed);
  return 0;
}
