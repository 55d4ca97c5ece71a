// npm run -s bench:engine [-- --check] [--json] [--minify] [--rounds 5]
// Measures the engine against a plain C program of the same model. Both must first meet the reference tables;
// --check does only that. --minify bundles the engine as the browser gets it. Ends with 1 when a side misses the
// tables, before anything is timed; with 2 and one line on wrong words.
import {parseArgs} from 'node:util';
import {type Case, MAP_RUN, ONE_HOUR, referenceCases, TWENTY_MINUTES} from './cases';
import {type Accuracy, accuracyOf} from './check';
import {coldTimes} from './cold';
import {type MapResult, type MemoryResult} from './jobs';
import {machine} from './machine';
import {Programs} from './programs';
import {accuracyText, type Report, reportText} from './report';
import {warmTimes} from './warm';

const ROUNDS = 5;

/** Wrong words on the command line. */
class UsageError extends Error {}

interface Wishes {
  readonly check: boolean;
  readonly json: boolean;
  readonly minify: boolean;
  readonly rounds: number;
}

function readWishes(): Wishes {
  const {values} = parseArgs({
    options: {
      check: {type: 'boolean', default: false},
      json: {type: 'boolean', default: false},
      minify: {type: 'boolean', default: false},
      rounds: {type: 'string', default: `${ROUNDS}`},
    },
  });
  const rounds = Number(values.rounds);
  if (!(rounds >= 1 && rounds % 1 === 0))
    throw new UsageError(`--rounds: ${values.rounds}, allowed: a whole number from 1`);
  return {...values, rounds};
}

async function main({check, json, minify, rounds}: Wishes): Promise<number> {
  const where = machine();
  const references = referenceCases();
  const programs = await Programs.make(minify);
  try {
    const all = [...references.values(), TWENTY_MINUTES, MAP_RUN];
    const accuracy = all.map((each) => accuracyOf(programs, each));
    const isRight = accuracy.every((each) => each.isRight);
    if (check || !isRight) {
      say(json ? {accuracy} : accuracyText(accuracy));
      if (!isRight) process.stderr.write('bench:engine: a side is wrong; nothing was timed\n');
      return isRight ? 0 : 1;
    }
    const report = {machine: where, minify, ...measure(programs, references, accuracy, rounds)};
    say(json ? report : reportText(report));
    return 0;
  } finally {
    programs.remove();
  }
}

function measure(
  programs: Programs,
  references: ReadonlyMap<string, Case>,
  accuracy: readonly Accuracy[],
  rounds: number,
): Omit<Report, 'machine' | 'minify'> {
  const of = (letter: string): Case => references.get(letter)!;
  const quiet = of('a');
  const others = [of('c'), of('d'), of('g')];
  const stands = [quiet, of('c'), TWENTY_MINUTES, of('d')];
  return {
    accuracy,
    warm: [
      ...stands.map((each) => warmTimes(programs, each, {rounds, keep: false})),
      warmTimes(programs, quiet, {rounds, keep: false, before: others}),
      ...stands.map((each) => warmTimes(programs, each, {rounds, keep: true})),
    ],
    cold: [
      ...[quiet, of('c'), of('d')].map((each) => coldTimes(programs, each, 60)),
      coldTimes(programs, TWENTY_MINUTES, 1200),
    ],
    map: [1, 2].map((workers) => ({workers, result: mapResult(programs, workers)})),
    memory: memoryResult(programs),
  };
}

function mapResult(programs: Programs, workers: number): MapResult {
  const file = `${programs.place(MAP_RUN)}.json`;
  return JSON.parse(programs.engine({kind: 'map', file, workers}).output) as MapResult;
}

function memoryResult(programs: Programs): MemoryResult {
  const file = `${programs.place(ONE_HOUR)}.json`;
  const {output} = programs.engine({kind: 'memory', file}, ['--expose-gc']);
  return JSON.parse(output) as MemoryResult;
}

function say(what: string | object): void {
  process.stdout.write(typeof what === 'string' ? what : `${JSON.stringify(what)}\n`);
}

// Ctrl-C ends the program that is just running; its failure then ends this one, the folder removed
process.once('SIGINT', () => undefined);
try {
  process.exitCode = await main(readWishes());
} catch (error) {
  // what a caller can put right; anything else is our bug and is shown whole
  const code = (error as NodeJS.ErrnoException).code ?? '';
  if (!(error instanceof UsageError) && !code.startsWith('ERR_PARSE_ARGS')) throw error;
  process.stderr.write(`bench:engine: ${(error as Error).message}\n`);
  process.exitCode = 2;
}
