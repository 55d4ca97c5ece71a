// The measured program: bundled together with the engine and run by itself, one job each.
//   node engine-program.mjs JOB     JOB is JSON, see jobs.ts; the answer is JSON on standard output
import fs from 'node:fs';
import {Worker} from 'node:worker_threads';
import {type Scenario, startRun, TraceBlock} from '#sim-core/index';
import {TraceStore} from '../../../src/app/live-run/trace/trace-store';
import {
  type Job,
  type MapPoint,
  type MapPointResult,
  type MapResult,
  type MapShare,
  type Memory,
  type MemoryResult,
  type TimedRun,
} from './jobs';

const SIDE = 32; // points of the map along each axis
const AT_ONCE = 1000; // rows that the page gets in one message

async function answer(job: Job): Promise<unknown> {
  const document = JSON.parse(fs.readFileSync(job.file, 'utf8')) as Scenario;
  switch (job.kind) {
    case 'rows':
      return tensionRows(document, job.everyTicks);
    case 'time':
      for (const file of job.before) {
        const other = JSON.parse(fs.readFileSync(file, 'utf8')) as Scenario;
        for (let run = 0; run < 10; run++) timedRun(other, null);
      }
      return timedRuns(document, job.runs, job.keep);
    case 'map':
      return await mapOf(document, job.file, job.workers);
    case 'memory':
      return memoryOf(document);
  }
}

function tensionRows(document: Scenario, everyTicks: number): number[] {
  const ticks = ticksOf(document) + 1;
  const block = new TraceBlock(ticks);
  startRun(document).advance(ticks, block);
  const rows: number[] = [];
  for (let row = 0; row < block.count; row += everyTicks) rows.push(block.at(row, 'tensionN'));
  return rows;
}

function timedRuns(document: Scenario, runs: number, keep: boolean): TimedRun[] {
  const block = keep ? new TraceBlock(ticksOf(document)) : null;
  return Array.from({length: runs}, () => timedRun(document, block));
}

/** From the document to the end of the run, its check included. */
function timedRun(document: Scenario, block: TraceBlock | null): TimedRun {
  const ticks = ticksOf(document);
  const from = process.hrtime.bigint();
  const cpuFrom = process.cpuUsage();
  if (block !== null) block.count = 0;
  const run = startRun(document);
  const done = block === null ? run.advance(ticks) : run.advance(ticks, block);
  const {user, system} = process.cpuUsage(cpuFrom);
  const ns = Number(process.hrtime.bigint() - from);
  const {rollRadps, webLeftM, brakeC, outputPct} = run.view();
  return {
    ns,
    cpuNs: 1000 * (user + system),
    ticks: done,
    sum: rollRadps + webLeftM + brakeC + outputPct,
  };
}

async function mapOf(document: Scenario, file: string, workers: number): Promise<MapResult> {
  const points = mapPoints(document);
  const from = performance.now();
  const cpuFrom = process.cpuUsage();
  const shares = Array.from({length: workers}, (_, share) =>
    points.filter((_point, place) => place % workers === share),
  );
  const results = (
    await Promise.all(shares.map((share) => mapThread({file, points: share})))
  ).flat();
  const {user, system} = process.cpuUsage(cpuFrom);
  const totalS = (performance.now() - from) / 1000;
  const errors = results.filter(({isBroken}) => !isBroken).map(({errorNs}) => errorNs);
  const ticks = results.reduce((sum, result) => sum + result.ticks, 0);
  return {
    totalS,
    cpuS: (user + system) / 1e6,
    simulatedS: ticks * sampleOf(document),
    points: results.length,
    broken: results.length - errors.length,
    leastNs: Math.min(...errors),
    greatestNs: Math.max(...errors),
  };
}

/** Gain and integral time from a quarter of the document's values to four times, evenly in the logarithm. */
function mapPoints({controller}: Scenario): MapPoint[] {
  const factors = Array.from({length: SIDE}, (_, place) => 4 ** ((2 * place) / (SIDE - 1) - 1));
  return factors.flatMap((gain) =>
    factors.map((time): MapPoint => [gain * controller.kp, time * controller.tiS]),
  );
}

function mapThread(share: MapShare): Promise<MapPointResult[]> {
  return new Promise((resolve, reject) => {
    const worker = new Worker(new URL('./map-thread.mjs', import.meta.url), {workerData: share});
    worker.once('message', resolve);
    worker.once('error', reject);
  });
}

/** Needs --expose-gc. */
function memoryOf(document: Scenario): MemoryResult {
  const ticks = ticksOf(document);
  const run = startRun(document);
  run.advance(1000); // the code is compiled before memory is looked at
  const before = memoryNow();
  // as the page keeps a run: block by block into its store
  const store = new TraceStore();
  const long = startRun(document);
  while (long.tick < ticks) {
    const block = new TraceBlock(Math.min(AT_ONCE, ticks - long.tick));
    long.advance(block.capacity, block);
    store.append(block);
  }
  const after = memoryNow();
  return {before, after, rows: store.count, rowBytes: store.bytesPerRow * store.count};
}

function memoryNow(): Memory {
  if (globalThis.gc === undefined) throw new Error('The memory job needs --expose-gc.');
  globalThis.gc();
  const {rss, heapUsed, arrayBuffers} = process.memoryUsage();
  return {rss, heapUsed, arrayBuffers};
}

function ticksOf(document: Scenario): number {
  return Math.floor(document.durationS / sampleOf(document) + 1e-6);
}

function sampleOf({controller}: Scenario): number {
  return controller.sampleS ?? 0.01;
}

fs.writeSync(1, JSON.stringify(await answer(JSON.parse(process.argv[2] ?? '') as Job)));
