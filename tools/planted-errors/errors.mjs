// Errors that somebody could make in the engine. Each is planted alone, in the plain equations and in the hot loop
// alike where both have the term: so it is not the comparison of the two that finds it, but a number from outside.

const EQUATIONS = 'sim-core/plant/equations.ts';
const LOOP = 'sim-core/run/quiet-ticks.ts';
const MOVE = 'sim-core/run/quiet-plant.ts';
const CELL = 'sim-core/run/quiet-cell.ts';
const DANCER = 'sim-core/run/quiet-dancer.ts';
const PID = 'sim-core/control/pid.ts';
const CONTROLLER = 'sim-core/control/controller.ts';

/** The same edit in the stages of both kinds of stand. */
const each = (from, to) => [
  [CELL, from, to],
  [DANCER, from, to],
];

/** `edits`: file, what stands there, what is put in its place, everywhere in the file. */
export const ERRORS = [
  {
    name: 'R for R_e: an uneven roll pulls at its mean radius',
    edits: [
      [EQUATIONS, 'rollN * radius : 0', 'rollN * Math.sqrt(square) : 0'],
      ...each('perInertia * r1 * pull1', 'perInertia * radius0 * pull1'),
      ...each('perInertia * r2 * pull2', 'perInertia * radius0 * pull2'),
      ...each('perInertia * r3 * pull3', 'perInertia * radius0 * pull3'),
      ...each('perInertia * r4 * pull4', 'perInertia * radius0 * pull4'),
    ],
  },
  {
    name: 'R for R_e: an uneven roll pays out at its mean radius',
    edits: [
      [
        EQUATIONS,
        'omega * radius * n[now.PER_WOUND]',
        'omega * Math.sqrt(square) * n[now.PER_WOUND]',
      ],
      ...each('(r1 * perWound)', '(radius0 * perWound)'),
      ...each('(r2 * perWound)', '(radius0 * perWound)'),
      ...each('(r3 * perWound)', '(radius0 * perWound)'),
      ...each('(r4 * perWound)', '(radius0 * perWound)'),
    ],
  },
  {
    name: 'no idler drag between nip and roll',
    edits: [[EQUATIONS, 'n[now.IDLER_N] = span.idlerDragN ?? 0', 'n[now.IDLER_N] = 0']],
  },
  {
    name: 'idlers without mass',
    edits: [[EQUATIONS, 'n[now.IDLER_KG] = span.idlerMassKg ?? 0', 'n[now.IDLER_KG] = 0']],
  },
  {
    name: 'no fade of a hot brake',
    edits: [
      [
        'sim-core/plant/brake.ts',
        'n[now.FADE_PER_K] = brake.fadePerK ?? 0',
        'n[now.FADE_PER_K] = 0',
      ],
    ],
  },
  {
    name: 'viscous drag with the wrong sign',
    edits: [
      [EQUATIONS, 'pull - n[now.VISCOUS]! * omega', 'pull + n[now.VISCOUS]! * omega'],
      ...each('perInertia * viscous', '-perInertia * viscous'),
    ],
  },
  {
    name: 'no friction in the bearings',
    edits: [['sim-core/plant/roll.ts', 'roll.coulombNm ?? 0', '0']],
  },
  {
    name: 'inertia with the cube of the radius',
    edits: [
      ['sim-core/plant/roll.ts', '(square * square)', '(square * Math.sqrt(square))'],
      [MOVE, 'perFourth * square * square;', 'perFourth * square * radius;'],
    ],
  },
  {
    name: 'momentum of the leaving web counted twice (a term ω·dJ/dt kept)',
    edits: [
      [
        EQUATIONS,
        'drag * sliding) / inertia(n, square)',
        'drag * sliding + 2 * omega * paidOut * square * n[now.INERTIA_PER_FOURTH]! * n[now.PER_LENGTH]!) / inertia(n, square)',
      ],
      ...each(
        '(perInertia * (drag',
        '(-perInertia * 2 * omega * omega * radius0 * radius0 * radius0 * perWound * n[now.INERTIA_PER_FOURTH]! * n[now.PER_LENGTH]! + perInertia * (drag',
      ),
    ],
  },
  {
    name: 'strain that the web was wound with left out',
    edits: [
      [
        EQUATIONS,
        'n[now.PER_WOUND] = 1 / (1 + n[now.WOUND_N]! / stiffnessN)',
        'n[now.PER_WOUND] = 1',
      ],
    ],
  },
  {
    name: 'web without loss',
    edits: [[EQUATIONS, 'n[now.LOSS_S] = web.lossTimeS ?? 0', 'n[now.LOSS_S] = 0']],
  },
  {
    name: 'web lost while slack (the span’s length cut at the path)',
    edits: [
      [
        EQUATIONS,
        'let lengthSlope = paidOut - v;',
        'let lengthSlope = length > path ? 0 : paidOut - v;',
      ],
    ],
  },
  {
    name: 'sensor reads the tension at the roll',
    edits: [
      [EQUATIONS, '(this.signal(tension) - y[at.FILTER]!)', '(this.signal(rollN) - y[at.FILTER]!)'],
      [CELL, '(lost1 - stiffness)', '0'],
      [CELL, '(lost2 - stiffness)', '0'],
      [CELL, '(lost4 - stiffness)', '0'],
    ],
  },
  {
    name: 'no breakaway grip',
    edits: [['sim-core/plant/brake.ts', '(brake.breakaway ?? 1) - 1', '0']],
  },
  {
    name: 'dead time off by one plant step',
    edits: [
      ['sim-core/plant/drive.ts', 'deadTimeS / plantStepS + 0.5', 'deadTimeS / plantStepS + 1.5'],
    ],
  },
  {
    name: 'play taken whole to either side',
    edits: [['sim-core/plant/drive.ts', '(playPct ?? 0) / 2', '(playPct ?? 0)']],
  },
  {
    name: 'heat from the drive’s torque before fade',
    edits: [
      [EQUATIONS, '(torque * Math.abs(omega)', '((torque / n[now.FADE]!) * Math.abs(omega)'],
      ...each('heats * (power - ', 'heats * (power / faded - '),
    ],
  },
  {
    name: 'straight ramps although the drive rounds',
    edits: [
      ['sim-core/plant/line.ts', 'this.state[ROUND_S] = roundS;', 'this.state[ROUND_S] = 0;'],
    ],
  },
  {
    name: 'derivative on the error',
    edits: [
      [PID, 'const change = y - state[at.LAST_Y]!;', 'const change = y - r - state[at.LAST_Y]!;'],
      [PID, 'state[at.LAST_Y] = y;', 'state[at.LAST_Y] = y - r;'],
      [
        LOOP,
        'const change = y - c[control.LAST_Y]!;',
        'const change = y - r - c[control.LAST_Y]!;',
      ],
      [LOOP, 'c[control.LAST_Y] = y;', 'c[control.LAST_Y] = y - r;'],
    ],
  },
  {
    name: 'derivative without its filter',
    edits: [
      [PID, 'tdS / tuning[set.DERIVATIVE_N]!', '0'],
      [LOOP, 'tdS / tuning[set.DERIVATIVE_N]!', '0'],
    ],
  },
  {
    name: 'weight of the set point left out',
    edits: [
      [PID, 'tuning[set.WEIGHT]! * r', 'r'],
      [LOOP, 'gain * (weight * r - y)', 'gain * (r - y)'],
    ],
  },
  {
    name: 'integral part winds up at a limit',
    edits: [
      [PID, '!pushes(limit, wanted - output, error)', 'true'],
      [LOOP, '!(limit * error > 0)', 'true'],
    ],
  },
  {
    name: 'loop closes with a bump',
    edits: [[PID, 'tuning[set.IS_BUMPLESS] === 1', 'false']],
  },
  {
    name: 'gain falls where it should rise with the radius',
    edits: [
      [CONTROLLER, 'radius * perReference', '1 / (radius * perReference)'],
      [LOOP, 'inner * radius * perReference', 'inner / (radius * perReference)'],
    ],
  },
  {
    name: 'inertia assist while speeding up too',
    edits: [
      [CONTROLLER, '!(slope < 0)', 'slope === 0'],
      [CONTROLLER, 'inertia * -slope', 'inertia * Math.abs(slope)'],
      [LOOP, 'hasAssist && c1 < 0', 'hasAssist && c1 !== 0'],
    ],
  },
  {
    name: 'stop-hold takes the output of its own tick, not of the stop’s',
    edits: [
      [
        CONTROLLER,
        'state[at.STOP_OUTPUT]! * phases.holdGain',
        'state[at.OUTPUT]! * phases.holdGain',
      ],
    ],
  },
  {
    name: 'start ramp from the run command, not from when the web is taut',
    edits: [
      [
        'sim-core/control/phases.ts',
        'state[at.RAMP_AT] = tick;\n    }',
        'state[at.RAMP_AT] = state[at.RUN_AT]!;\n    }',
      ],
    ],
  },
  {
    name: 'dancer feels the web once, not twice',
    edits: [
      [EQUATIONS, '2 * n[now.LOADING]! - 2 * tension', '2 * n[now.LOADING]! - tension'],
      [DANCER, '(2 * (loadingN - (pull', '(2 * loadingN - (pull'],
      [DANCER, ' - stiffness))) - damping', ' - stiffness)) - damping'],
    ],
  },
  {
    name: 'hot loop alone: the turn of the roll forgotten between steps',
    edits: each('sin = sin * near + before * far;', 'sin = sin * near;'),
  },
  {
    name: 'hot loop alone: radius kept over a tick',
    edits: [
      [MOVE, '-n[now.PER_LENGTH]! * omega * radius * n[now.PER_WOUND]! * inertia * inverse', '0'],
    ],
  },
];
