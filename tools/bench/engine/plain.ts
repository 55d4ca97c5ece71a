import {execFileSync} from 'node:child_process';
import fs from 'node:fs';
import path from 'node:path';
import {type Scenario, withDefaults} from '#sim-core/index';

/** Compiles the plain C program into `folder`; answers its path. Throws when there is no gcc. */
export function compilePlain(folder: string): string {
  const program = path.join(folder, 'plain');
  const source = path.join(import.meta.dirname, 'plain.c');
  execFileSync('gcc', ['-O2', '-o', program, source, '-lm']);
  return program;
}

/** Rows of the C program each tenth of a second: time [s] and tension [N]. */
export function plainRows(program: string, document: Scenario): [number, number][] {
  return withFile(program, document, (file) =>
    execFileSync(program, [file, 'rows'], {encoding: 'utf8'})
      .trim()
      .split('\n')
      .map((line) => line.split(',').map(Number) as [number, number]),
  );
}

/** Seconds of each of `times` runs in one process; `keep`: twelve columns a tick are kept in memory. */
export function plainTimes(
  program: string,
  document: Scenario,
  times: number,
  how: 'time' | 'keep' = 'time',
): number[] {
  return withFile(program, document, (file) =>
    execFileSync(program, [file, how, String(times)], {
      encoding: 'utf8',
      stdio: ['ignore', 'pipe', 'ignore'],
    })
      .trim()
      .split('\n')
      .map(Number),
  );
}

function withFile<T>(program: string, document: Scenario, use: (file: string) => T): T {
  const file = path.join(path.dirname(program), 'document.txt');
  fs.writeFileSync(file, flat(document));
  return use(file);
}

/** The document as lines of key and value, the form that the C program reads. */
function flat(document: Scenario): string {
  const {web, roll, span, brake, sensing, controller, line, actions, ...top} =
    withDefaults(document);
  const lines = [`isDancer ${sensing.kind === 'dancer' ? 1 : 0}`];
  const known = new Set(knownKeys());
  for (const part of [top, web, roll, span, brake, sensing, controller])
    for (const [key, value] of Object.entries(part))
      if (known.has(key)) lines.push(`${key} ${Number(value)}`);
  if (controller.startOutputPct === undefined) lines.push('startOutputPct -1');
  for (const [x, y] of brake.curve ?? []) lines.push(`point ${x} ${y}`);
  for (const each of line)
    lines.push(
      `line ${each.atS} ${each.command} ${'speedMps' in each ? each.speedMps : 0} ${each.rampS}`,
    );
  for (const action of actions)
    if ('set' in action)
      for (const [key, value] of Object.entries(action.set))
        lines.push(`set ${action.atS} ${key} ${Number(value)}`);
  return `${lines.join('\n')}\n`;
}

function knownKeys(): string[] {
  const source = fs.readFileSync(path.join(import.meta.dirname, 'plain.c'), 'utf8');
  return [...source.matchAll(/KEY\((\w+)\)/g)].map(([, key]) => key!);
}
