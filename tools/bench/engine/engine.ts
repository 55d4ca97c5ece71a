import {build} from 'esbuild';
import {execFileSync} from 'node:child_process';
import path from 'node:path';
import {pathToFileURL} from 'node:url';
import {type Run, type Scenario, type TraceBlock} from '#sim-core/index';

/** The engine as a program that uses it gets it: bundled, with numbers in the place of constants. */
export interface Engine {
  startRun(document: unknown): Run;
  readonly TraceBlock: typeof TraceBlock;
}

/** Bundles the engine's door into `folder`; answers the file. */
export async function bundleEngine(folder: string): Promise<string> {
  const outfile = path.join(folder, 'engine.mjs');
  await build({
    entryPoints: [path.join(import.meta.dirname, '../../../sim-core/index.ts')],
    outfile,
    bundle: true,
    format: 'esm',
    platform: 'node',
    minifySyntax: true,
    logLevel: 'silent',
  });
  return outfile;
}

export async function loadEngine(file: string): Promise<Engine> {
  return (await import(pathToFileURL(file).href)) as Engine;
}

/** Seconds of one run, without its start, with or without rows. */
export function engineTime(engine: Engine, document: Scenario, keep = false): number {
  const ticks = Math.floor(document.durationS / (document.controller.sampleS ?? 0.01));
  const block = keep ? new engine.TraceBlock(ticks) : undefined;
  const run = engine.startRun(document);
  const from = process.hrtime.bigint();
  run.advance(ticks, block);
  return Number(process.hrtime.bigint() - from) / 1e9;
}

/** Rows each tenth of a second: time [s] and tension [N]; the last is the one before the web broke. */
export function engineRows(engine: Engine, document: Scenario): [number, number][] {
  const sampleS = document.controller.sampleS ?? 0.01;
  const ticks = Math.round(document.durationS / sampleS) + 1;
  const block = new engine.TraceBlock(ticks);
  engine.startRun(document).advance(ticks, block);
  const every = Math.round(0.1 / sampleS);
  const rows: [number, number][] = [];
  for (let row = 0; row < block.count; row += every)
    rows.push([row * sampleS, block.at(row, 'tensionN')]);
  return rows;
}

/** Seconds in a new process: the first run in it, and the process from start to end. */
export function coldTimes(
  file: string,
  document: Scenario,
): {readonly run: number; readonly whole: number} {
  const ticks = Math.floor(document.durationS / (document.controller.sampleS ?? 0.01));
  const script = `
    import {startRun} from ${JSON.stringify(pathToFileURL(file).href)};
    const from = process.hrtime.bigint();
    startRun(${JSON.stringify(document)}).advance(${ticks});
    console.log(Number(process.hrtime.bigint() - from) / 1e9);`;
  const from = process.hrtime.bigint();
  const said = execFileSync(process.execPath, ['--input-type=module', '-e', script], {
    encoding: 'utf8',
  });
  return {run: Number(said), whole: Number(process.hrtime.bigint() - from) / 1e9};
}
