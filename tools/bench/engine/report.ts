import {type Accuracy, TOLERANCE_PCT} from './check';
import {type ColdTimes} from './cold';
import {type MapResult, type MemoryResult} from './jobs';
import {type Machine} from './machine';
import {type Spread} from './spread';
import {type WarmTimes} from './warm';

/** Everything measured in one go. */
export interface Report {
  readonly machine: Machine;
  /** Whether the engine was bundled as a browser gets it. */
  readonly minify: boolean;
  readonly accuracy: readonly Accuracy[];
  readonly warm: readonly WarmTimes[];
  readonly cold: readonly ColdTimes[];
  readonly map: readonly {readonly workers: number; readonly result: MapResult}[];
  readonly memory: MemoryResult;
}

type Row = readonly string[];

function machineText({cores, cpu, memoryGiB, node, gcc, load}: Machine, minify: boolean): string {
  const bundle = minify ? 'minified, as in a browser' : 'as on the server';
  return `${cores} × ${cpu}, ${memoryGiB} GiB, Node.js ${node}, gcc ${gcc} -O2, load ${load}; engine bundled ${bundle}\n`;
}

export function accuracyText(accuracy: readonly Accuracy[]): string {
  const rows = accuracy.map(({name, enginePct, plainPct, apartPct, isRight}) => [
    name,
    pctText(enginePct),
    pctText(plainPct),
    pctText(apartPct),
    isRight ? 'right' : 'WRONG',
  ]);
  const head = ['worst tension error, % of range', 'engine', 'C', 'apart', `< ${TOLERANCE_PCT} %`];
  return table(head, rows);
}

export function reportText({machine, minify, accuracy, warm, cold, map, memory}: Report): string {
  return [
    machineText(machine, minify),
    accuracyText(accuracy),
    warmText(warm),
    coldText(cold),
    table(
      ['map of 32 × 32 runs of 60 s, rows kept', 'total s', 'CPU s', 'simulated s', 'broken'],
      map.map(({workers, result: {totalS, cpuS, simulatedS, broken}}) => [
        workers === 1 ? '1 worker' : `${workers} workers`,
        totalS.toFixed(1),
        cpuS.toFixed(1),
        simulatedS.toFixed(0),
        `${broken}`,
      ]),
    ),
    memoryText(memory),
  ].join('\n');
}

function warmText(warm: readonly WarmTimes[]): string {
  const rows = warm.map(({name, keepsRows, engineUs, plainUs, ratio, clockRatio}) => [
    keepsRows ? `${name}, rows kept` : name,
    spreadText(engineUs, 1),
    spreadText(plainUs, 1),
    spreadText(ratio, 2),
    spreadText(clockRatio, 2),
  ]);
  const head = [
    'warm, µs of CPU per simulated second',
    'engine',
    'C',
    'engine / C',
    'by the clock',
  ];
  return table(head, rows);
}

function coldText(cold: readonly ColdTimes[]): string {
  const rows = cold.flatMap((each) => [
    [
      `${each.name}, first run`,
      spreadText(each.engineRunMs, 1),
      spreadText(each.plainRunMs, 1),
      spreadText(each.runRatio, 2),
    ],
    [
      `${each.name}, first run, CPU`,
      spreadText(each.engineCpuMs, 1),
      spreadText(each.plainCpuMs, 1),
      spreadText(each.cpuRatio, 2),
    ],
    [
      `${each.name}, whole process`,
      spreadText(each.engineProcessMs, 1),
      spreadText(each.plainProcessMs, 1),
      spreadText(each.processRatio, 2),
    ],
  ]);
  return table(['cold, ms in a new process', 'engine', 'C', 'engine / C'], rows);
}

function memoryText({before, after, rows, rowBytes}: MemoryResult): string {
  const mb = (bytes: number): string => (bytes / 1e6).toFixed(1);
  const head = ['one hour with rows, MB', 'before', 'after', 'more'];
  const lines = (['rss', 'heapUsed', 'arrayBuffers'] as const).map((name) => [
    name,
    mb(before[name]),
    mb(after[name]),
    mb(after[name] - before[name]),
  ]);
  return table(head, [
    ...lines,
    [`${rows} rows of ${(rowBytes / rows).toFixed(0)} B`, '', mb(rowBytes), mb(rowBytes)],
  ]);
}

function spreadText({median, least, greatest}: Spread, digits: number): string {
  return `${median.toFixed(digits)} (${least.toFixed(digits)}…${greatest.toFixed(digits)})`;
}

function pctText(pct: number | null): string {
  return pct === null ? '–' : pct.toFixed(5);
}

/** First column to the left, the others to the right. */
function table(head: Row, rows: readonly Row[]): string {
  const widths = head.map((_, column) =>
    Math.max(...[head, ...rows].map((row) => row[column]?.length ?? 0)),
  );
  const lines = [head, widths.map((width) => '-'.repeat(width)), ...rows].map((row) =>
    row
      .map((cell, column) =>
        column === 0 ? cell.padEnd(widths[0]!) : cell.padStart(widths[column]!),
      )
      .join('  ')
      .trimEnd(),
  );
  return `${lines.join('\n')}\n`;
}
