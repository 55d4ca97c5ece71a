import {Attempt, type AttemptState, type Batch, type Entry} from '#shared/attempts/attempt';
import {type ExerciseToRun} from '#shared/exercises/exercise';
import {PROBLEM_STATUS, type Problem, type ProblemCode} from '#shared/problem';
import {type LogEntry} from '#sim-core/index';
import {ApiFailure} from '../../platform/api-failure';
import {anExercise} from './an-exercise';

/** Stands in for the server in specs: takes batches by the rules of the log, and can be away or forget. */
export class AttemptServer {
  readonly attemptId = crypto.randomUUID();
  readonly exerciseId = crypto.randomUUID();
  /** Every batch that arrived, as it travelled, answered or not. */
  readonly arrived: string[] = [];
  readonly beats: number[] = [];
  batches: Batch[] = [];
  state: AttemptState = 'running';
  throughTick = 0;
  /** Nothing arrives. */
  isAway = false;
  /** What arrives is done, the answer is lost. */
  losesAnswers = false;
  /** Refuses the next batches with these, then goes on. */
  readonly refusals: ApiFailure[] = [];
  /** Requests that arrived and are not answered yet, at most. */
  mostAtOnce = 0;
  private atOnce = 0;

  constructor(
    public writerKey: string = crypto.randomUUID(),
    readonly document: ExerciseToRun = anExercise(),
  ) {}

  get entries(): Entry[] {
    return this.batches.flatMap(({entries}) => entries);
  }

  readonly start = async (attemptId: string, exerciseId: string, writerKey: string) => {
    await this.travel();
    this.started.push({attemptId, exerciseId, writerKey});
    this.writerKey = writerKey;
    return this.answer(this.summary());
  };
  readonly started: {attemptId: string; exerciseId: string; writerKey: string}[] = [];

  readonly sendBatch = async (_id: string, batch: Batch) => {
    await this.travel();
    this.arrived.push(JSON.stringify(batch));
    this.mostAtOnce = Math.max(this.mostAtOnce, ++this.atOnce);
    await Promise.resolve();
    this.atOnce--;
    const refusal = this.refusals.shift();
    if (refusal !== undefined) throw refusal;
    this.take(batch);
    return this.answer({lastBatch: this.batches.length, state: this.state});
  };

  readonly sendBeat = async (_id: string, writerKey: string, throughTick: number) => {
    await this.travel();
    this.checkWriter(writerKey);
    this.beats.push(throughTick);
    return this.answer({nextBeatS: 10});
  };

  readonly attempt = async () => {
    await this.travel();
    return this.answer(this.summary());
  };

  readonly log = async () => {
    await this.travel();
    return this.answer({
      entries: structuredClone(this.entries) as LogEntry[],
      lastBatch: this.batches.length,
      throughTick: this.throughTick,
    });
  };

  readonly takeOver = async (_id: string, writerKey: string) => {
    await this.travel();
    if (this.state !== 'running') throw aFailure('attempt-over');
    this.writerKey = writerKey;
    return this.answer(this.summary());
  };

  private take(batch: Batch): void {
    this.checkWriter(batch.writerKey);
    const known = this.batches[batch.number - 1];
    if (known !== undefined) {
      if (JSON.stringify(known.entries) !== JSON.stringify(batch.entries))
        throw aFailure('batch-differs');
      return;
    }
    const wanted = this.batches.length + 1;
    if (batch.number !== wanted) throw aFailure('batch-missing', {wanted});
    if (batch.entries[0]?.n !== this.entries.length + 1) throw aFailure('entry-refused');
    this.batches.push(structuredClone(batch));
    this.throughTick = Math.max(this.throughTick, batch.throughTick);
    if (batch.entries.at(-1)?.kind === 'end') this.state = 'handed-in';
  }

  private checkWriter(writerKey: string): void {
    if (writerKey !== this.writerKey) throw aFailure('writer-changed');
  }

  private async travel(): Promise<void> {
    await Promise.resolve();
    if (this.isAway) throw new ApiFailure('offline', 'The server did not answer.');
  }

  private answer<T>(answer: T): T {
    if (this.losesAnswers) throw new ApiFailure('offline', 'The server did not answer.');
    return answer;
  }

  private summary(): Attempt {
    return Attempt.parse({
      id: this.attemptId,
      exercise: {id: this.exerciseId, number: this.document.number, title: this.document.title},
      person: {id: crypto.randomUUID(), name: 'Rosa Lind'},
      state: this.state,
      startedAt: '2026-03-02T08:00:00.000Z',
      handedInAt: null,
      score: null,
      passed: null,
      exerciseDocument: this.document,
      seed: this.document.scenario.seed,
      lastBatch: this.batches.length,
      throughTick: this.throughTick,
      result: null,
      failure: null,
    });
  }
}

/** A refusal as the server tells it. */
export function aFailure(code: ProblemCode, more: Partial<Problem> = {}): ApiFailure {
  return new ApiFailure(code, `refused: ${code}`, {
    type: `urn:evenspan:problem:${code}`,
    code,
    title: code,
    status: PROBLEM_STATUS[code],
    requestId: 'request-1',
    errors: [],
    ...more,
  });
}
