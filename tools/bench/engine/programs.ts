import {execFileSync, spawnSync} from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import {build} from 'esbuild';
import {type Case, tensions} from './cases';
import {documentText} from './document-text';
import {type Job, type TimedRun} from './jobs';

const HERE = import.meta.dirname;
const ROOT = path.join(HERE, '..', '..', '..');
const MOST_OUTPUT_B = 64e6;

/** What a program said, and how long the whole process took. */
export interface Answer {
  readonly output: string;
  readonly processMs: number;
}

/** Both programs, built in a folder of their own; `remove` deletes it. */
export class Programs {
  /** `minify`: the engine as a browser gets it; else as the server's programs are bundled. */
  static async make(minify: boolean): Promise<Programs> {
    const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'engine-bench-'));
    const programs = new Programs(folder);
    try {
      programs.compilePlain();
      await programs.bundleEngine(minify);
    } catch (error) {
      programs.remove(); // no compiler, or code that does not build: told by the error
      throw error;
    }
    return programs;
  }

  private readonly written = new Map<Case, string>();

  private constructor(private readonly folder: string) {}

  remove(): void {
    fs.rmSync(this.folder, {recursive: true, force: true});
  }

  /** File of a case's document without its ending: `.json` for the engine, `.txt` for the C program. */
  place(each: Case): string {
    const known = this.written.get(each);
    if (known !== undefined) return known;
    const place = path.join(this.folder, `document-${this.written.size}`);
    fs.writeFileSync(`${place}.json`, JSON.stringify(each.document));
    fs.writeFileSync(`${place}.txt`, documentText(each.document));
    this.written.set(each, place);
    return place;
  }

  engine(job: Job, nodeWords: readonly string[] = []): Answer {
    const program = path.join(this.folder, 'engine-program.mjs');
    return ask(process.execPath, [...nodeWords, program, JSON.stringify(job)]);
  }

  engineRows(each: Case, everyTicks: number): number[] {
    const file = `${this.place(each)}.json`;
    return JSON.parse(this.engine({kind: 'rows', file, everyTicks}).output) as number[];
  }

  plainRows(each: Case, everyS: number): number[] {
    return tensions(ask(this.plain, [`${this.place(each)}.txt`, 'rows', `${everyS}`]).output);
  }

  plainTimes(each: Case, runs: number, keep: boolean): {runs: TimedRun[]; processMs: number} {
    const words = [`${this.place(each)}.txt`, 'time', `${runs}`, ...(keep ? ['keep'] : [])];
    const {output, processMs} = ask(this.plain, words);
    const lines = output.trim().split('\n');
    return {runs: lines.map(timedRun), processMs};
  }

  engineTimes(
    each: Case,
    runs: number,
    keep: boolean,
    before: readonly Case[] = [],
  ): {runs: TimedRun[]; processMs: number} {
    const {output, processMs} = this.engine({
      kind: 'time',
      file: `${this.place(each)}.json`,
      runs,
      keep,
      before: before.map((other) => `${this.place(other)}.json`),
    });
    return {runs: JSON.parse(output) as TimedRun[], processMs};
  }

  private get plain(): string {
    return path.join(this.folder, 'plain');
  }

  private compilePlain(): void {
    execFileSync('gcc', ['-O2', '-o', this.plain, path.join(HERE, 'plain.c'), '-lm']);
  }

  private async bundleEngine(minify: boolean): Promise<void> {
    await build({
      absWorkingDir: ROOT,
      entryPoints: ['engine-program', 'map-thread'].map((name) => path.join(HERE, `${name}.ts`)),
      outdir: this.folder,
      outExtension: {'.js': '.mjs'},
      bundle: true,
      platform: 'node',
      target: 'node20',
      format: 'esm',
      minify,
      minifySyntax: true,
      tsconfig: 'tsconfig.json',
      logLevel: 'silent', // the error thrown says it all
    });
  }
}

function ask(program: string, words: readonly string[]): Answer {
  const from = performance.now();
  const {status, stdout, stderr, error} = spawnSync(program, words, {
    encoding: 'utf8',
    maxBuffer: MOST_OUTPUT_B,
  });
  const processMs = performance.now() - from;
  if (error !== undefined) throw error;
  if (status !== 0) throw new Error(`${program} ended with ${status}: ${stderr.trim()}`);
  return {output: stdout, processMs};
}

/** A line "NS CPU_NS TICKS SUM" of the C program. */
function timedRun(line: string): TimedRun {
  const [ns = NaN, cpuNs = NaN, ticks = NaN, sum = NaN] = line.split(' ').map(Number);
  return {ns, cpuNs, ticks, sum};
}
