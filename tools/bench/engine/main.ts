// npm run -s bench:engine [-- --json | --check]: the engine against plain.c, both checked first. Figures, no test.
import {execFileSync} from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import {parseArgs} from 'node:util';
import {answeredCases, longRun, timedCases} from './cases';
import {bundleEngine, coldTimes, type Engine, engineRows, engineTime, loadEngine} from './engine';
import {mapTime, SIDE} from './map';
import {hourOfRows} from './memory';
import {compilePlain, plainRows, plainTimes} from './plain';

/** Allowed difference in tension, as a share of range. */
const TOLERANCE = 2e-4;

/** Times each side runs a case; the two take turns. */
const ROUNDS = 7;

const {values} = parseArgs({
  options: {json: {type: 'boolean', default: false}, check: {type: 'boolean', default: false}},
});
const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'evenspan-bench-'));
try {
  const program = compilePlain(folder);
  const file = await bundleEngine(folder);
  const engine = await loadEngine(file);
  const worst = check(program, engine);
  if (values.check) print('worst difference in tension, % of range', worst);
  else await measure(program, engine, file, worst);
} finally {
  fs.rmSync(folder, {recursive: true, force: true});
}

type Table = readonly Readonly<Record<string, string | number>>[];

/** Both sides on every reference case; throws when one misses the tolerance: their times would say nothing. */
function check(program: string, engine: Engine): Table {
  return answeredCases().map(({name, document, rows, rangeN}) => {
    const apart = (found: readonly (readonly [number, number])[]): number => {
      const byTime = new Map(found.map(([t, tension]) => [t.toFixed(1), tension]));
      const gaps = rows.map(([t, tension]) =>
        Math.abs((byTime.get(t.toFixed(1)) ?? NaN) - tension),
      );
      const share = Math.max(...gaps) / rangeN;
      if (!(share <= TOLERANCE)) throw new Error(`${name} misses the tolerance: ${share}`);
      return Number((100 * share).toPrecision(2));
    };
    return {
      case: name,
      engine: apart(engineRows(engine, document)),
      'plain C': apart(plainRows(program, document)),
    };
  });
}

async function measure(program: string, engine: Engine, file: string, worst: Table): Promise<void> {
  const warm = [false, true].flatMap((keep) =>
    timedCases().map(({name, document}) => {
      const [ours, plain]: [number[], number[]] = [[], []];
      for (let round = 0; round < ROUNDS; round++) {
        ours.push(engineTime(engine, document, keep));
        plain.push(...plainTimes(program, document, 1, keep ? 'keep' : 'time'));
      }
      return compared(keep ? `${name}, rows kept` : name, document.durationS, ours, plain);
    }),
  );
  const cold = [60, 1200].map((durationS) => {
    const document = {...longRun(), durationS};
    const ours = Array.from({length: ROUNDS}, () => coldTimes(file, document));
    const plain = plainTimes(program, document, 1);
    const whole = wholeTime(program, document);
    return {
      run: `${durationS} s`,
      'first run, engine ms': ms(median(ours.map(({run}) => run))),
      'first run, C ms': ms(median(plain)),
      'process, engine ms': ms(median(ours.map((each) => each.whole))),
      'process, C ms': ms(whole),
      'ratio of processes': round(median(ours.map((each) => each.whole)) / whole),
    };
  });
  const runs = SIDE * SIDE;
  const map = [];
  for (const workers of [1, 2]) {
    const seconds = await mapTime(file, workers);
    map.push({map: `${runs} runs of 60 s`, workers, seconds: round(seconds)});
  }
  const {rowsMb, grownMb} = hourOfRows(engine, longRun());
  const memory = [
    {'an hour, 360 000 rows': 'MB', rows: round(rowsMb), 'all growth': round(grownMb)},
  ];
  const result = {machine: machine(), worst, warm, cold, map, memory};
  if (values.json) console.log(JSON.stringify(result));
  else for (const [title, table] of Object.entries(result)) print(title, table);
}

function compared(name: string, durationS: number, ours: number[], plain: number[]) {
  const [a, b] = [median(ours), median(plain)];
  return {
    case: name,
    'engine µs/s': round((1e6 * a) / durationS),
    'C µs/s': round((1e6 * b) / durationS),
    ratio: round(a / b),
    'engine spread': spread(ours),
    'C spread': spread(plain),
  };
}

function wholeTime(program: string, document: ReturnType<typeof longRun>): number {
  return median(
    Array.from({length: ROUNDS}, () => {
      const from = process.hrtime.bigint();
      plainTimes(program, document, 1);
      return Number(process.hrtime.bigint() - from) / 1e9;
    }),
  );
}

function machine(): Table {
  const gcc = execFileSync('gcc', ['-dumpfullversion'], {encoding: 'utf8'}).trim();
  return [
    {
      cores: os.cpus().length,
      processor: os.cpus()[0]?.model ?? '',
      'memory GB': Math.round(os.totalmem() / 2 ** 30),
      node: process.version,
      gcc,
    },
  ];
}

function median(numbers: readonly number[]): number {
  const sorted = [...numbers].sort((a, b) => a - b);
  return sorted[Math.floor(sorted.length / 2)] ?? NaN;
}

function spread(numbers: readonly number[]): string {
  return `${Math.round((100 * (Math.max(...numbers) - Math.min(...numbers))) / median(numbers))} %`;
}

function ms(seconds: number): number {
  return round(1000 * seconds);
}

function round(value: number): number {
  return Number(value.toPrecision(3));
}

function print(title: string, table: Table): void {
  const [first = {}] = table;
  const heads = Object.keys(first);
  const cells = [heads, ...table.map((row) => heads.map((head) => String(row[head])))];
  const widths = heads.map((_, place) => Math.max(...cells.map((row) => row[place]!.length)));
  console.log(`\n${title}`);
  for (const row of cells)
    console.log(row.map((cell, place) => cell.padEnd(widths[place]!)).join('  '));
}
