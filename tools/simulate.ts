// npm run -s simulate -- FILE.json [--set controller.kp=0.2] [--every 0.01] [--out FILE.csv] [--events FILE]
//   [--measures FILE] [--hash]
// Runs one scenario document, with values changed by --set. Rows go to standard output without --out. --hash writes
// the fingerprint after durationS to standard error. Ends with 2 and one line on wrong input, with 1 when a state
// diverged.
import fs from 'node:fs';
import {parseArgs} from 'node:util';
import {
  PHASES,
  type Run,
  type Scenario,
  ScenarioError,
  startRun,
  TraceBlock,
  type TraceColumn,
} from '#sim-core/index';
import {setValues} from './simulate/set-values';
import {UsageError} from './simulate/usage';
import {measureRun} from './simulate/windows';

/** Columns of the table between time and phase, each with its name there. */
const COLUMNS: readonly (readonly [TraceColumn, string])[] = [
  ['tensionN', 'tension_N'],
  ['measuredN', 'measured_N'],
  ['setPointN', 'setpoint_N'],
  ['outputPct', 'output_pct'],
  ['lineMps', 'line_mps'],
  ['rollRadps', 'roll_radps'],
  ['radiusM', 'radius_m'],
  ['slackM', 'slack_m'],
  ['torqueNm', 'torque_Nm'],
  ['brakeC', 'brake_C'],
  ['dancerM', 'dancer_m'],
];
const USUAL_S = 0.01;
const DIGITS = 9;
const ROWS_AT_ONCE = 10_000;

/** How often a row is written, and how far the run goes. */
interface Plan {
  readonly sampleS: number;
  /** Control ticks between two rows. */
  readonly every: number;
  /** Tick of the last row. */
  readonly last: number;
  /** Ticks within durationS. */
  readonly within: number;
}

function main(words: readonly string[]): number {
  const {file, everyS, out, events, measures, set, hash} = readWords(words);
  const document = readDocument(file);
  setValues(document, set);
  const run = startRun(document);
  const plan = planOf(run, document as {readonly durationS: number}, everyS);
  const target = out === undefined ? 1 : openFile(out);
  const print = writeRows(run, plan, target);
  if (events !== undefined) writeFile(events, eventsWithin(run, plan));
  if (measures !== undefined) writeFile(measures, measuresOfWhole(document as Scenario, plan));
  if (hash) process.stderr.write(`${print}\n`);
  if (run.outcome.kind !== 'diverged') return 0;
  process.stderr.write(`simulate: the state diverged at ${run.outcome.atS} s\n`);
  return 1;
}

function readWords(words: readonly string[]) {
  const {values, positionals} = parseArgs({
    args: [...words],
    allowPositionals: true,
    options: {
      every: {type: 'string'},
      out: {type: 'string'},
      events: {type: 'string'},
      measures: {type: 'string'},
      set: {type: 'string', multiple: true, default: []},
      hash: {type: 'boolean', default: false},
    },
  });
  const [file] = positionals;
  if (file === undefined || positionals.length !== 1)
    throw new UsageError(
      'expected one scenario file: simulate FILE.json [--set KEY=VALUE] [--every 0.01] [--out FILE.csv]',
    );
  const everyS = values.every === undefined ? undefined : Number(values.every);
  return {...values, file, everyS};
}

function readDocument(file: string): unknown {
  try {
    return JSON.parse(fs.readFileSync(file, 'utf8'));
  } catch (error) {
    // a file that is not there or is not JSON
    throw new UsageError(`${file}: ${(error as Error).message.split('\n')[0] ?? ''}`);
  }
}

function planOf(
  run: Run,
  {durationS}: {readonly durationS: number},
  asked: number | undefined,
): Plan {
  const sampleS = run.settings()['sampleS'] as number;
  // without a word about it a row each 0.01 s, or each tick where that does not fit
  const everyS = asked ?? (fits(USUAL_S, sampleS) ? USUAL_S : sampleS);
  const every = Math.round(everyS / sampleS);
  if (!fits(everyS, sampleS))
    throw new UsageError(`--every: ${everyS}, allowed: a whole multiple of sampleS (${sampleS} s)`);
  const within = Math.floor(durationS / sampleS + 1e-6);
  return {sampleS, every, last: within - (within % every), within};
}

function fits(everyS: number, sampleS: number): boolean {
  const every = Math.round(everyS / sampleS);
  return every >= 1 && Math.abs(everyS / sampleS - every) < 1e-6;
}

/** Writes all rows; answers the fingerprint at the end of durationS. */
function writeRows(run: Run, plan: Plan, target: number): string {
  write(target, `t_s,${COLUMNS.map(([, name]) => name).join(',')},phase\n`);
  let rest = 0; // ticks beyond the block's start that the next row is away
  const record = (ticks: number): void => {
    const block = new TraceBlock(ticks);
    const from = run.tick;
    run.advance(ticks, block);
    const lines: string[] = [];
    for (let row = rest; row < block.count; row += plan.every)
      if (from + row <= plan.last) lines.push(lineOf(block, row, (from + row) * plan.sampleS));
    rest = (((rest - ticks) % plan.every) + plan.every) % plan.every;
    write(target, lines.join(''));
  };
  while (run.outcome.kind === 'running' && run.tick < plan.within)
    record(Math.min(ROWS_AT_ONCE, plan.within - run.tick));
  const print = run.hash();
  // the last row shows the set point and the phase of its own tick
  if (run.outcome.kind === 'running') record(1);
  return print;
}

function lineOf(block: TraceBlock, row: number, t: number): string {
  const numbers = COLUMNS.map(([column]) => shortest(block.at(row, column)));
  return `${shortest(t)},${numbers.join(',')},${PHASES[block.at(row, 'phase')] ?? ''}\n`;
}

function shortest(value: number): string {
  return String(Number(value.toPrecision(DIGITS)));
}

function eventsWithin(run: Run, {within, sampleS}: Plan): string {
  const untilS = within * sampleS + 1e-9;
  const {outcome} = run;
  const all = outcome.kind === 'diverged' ? [...run.events, outcome] : run.events;
  return `${JSON.stringify(
    all.filter(({atS}) => atS <= untilS),
    null,
    2,
  )}\n`;
}

/** Measures on every control tick: the run once more, its rows kept. */
function measuresOfWhole(document: Scenario, {within}: Plan): string {
  const block = new TraceBlock(within);
  startRun(document).advance(within, block);
  return `${JSON.stringify(measureRun(document, block), null, 2)}\n`;
}

function openFile(file: string): number {
  try {
    return fs.openSync(file, 'w');
  } catch (error) {
    throw new UsageError(`${file}: ${(error as Error).message}`); // a folder that is not there
  }
}

function writeFile(file: string, text: string): void {
  const target = openFile(file);
  write(target, text);
  fs.closeSync(target);
}

/** Writes all of it; a pipe that is full is tried again. */
function write(target: number, text: string): void {
  let rest = Buffer.from(text);
  while (rest.length > 0) {
    try {
      rest = rest.subarray(fs.writeSync(target, rest));
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code !== 'EAGAIN') throw error;
    }
  }
}

try {
  process.exitCode = main(process.argv.slice(2));
} catch (error) {
  // what a caller can put right; anything else is our bug and is shown whole
  const code = (error as NodeJS.ErrnoException).code ?? '';
  const isUsage = error instanceof UsageError || code.startsWith('ERR_PARSE_ARGS');
  if (code === 'EPIPE') process.exitCode = 0;
  else if (!isUsage && !(error instanceof ScenarioError)) throw error;
  else {
    process.stderr.write(`simulate: ${(error as Error).message}\n`);
    process.exitCode = 2;
  }
}
