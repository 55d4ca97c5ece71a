import {randomUUID} from 'node:crypto';
import {type LogEntry} from '#sim-core/index';
import {type Exercise} from '#shared/exercises/exercise';
import {type Caller} from '../caller';
import {STOP_WITHOUT_A_LOOP} from '../demo/documents/stop-without-a-loop';
import {ExerciseService} from '../features/exercises/exercise-service';
import {type Agent, type SignedIn, type TestServer} from './test-server';

/** An attempt that runs, and who writes to it. */
export interface Made {
  readonly id: string;
  readonly writerKey: string;
  readonly exerciseId: string;
  readonly agent: Agent;
}

/** Publishes the exercise of the demo in the caller's organisation, changed as asked for. */
export function publishExercise(
  {db}: TestServer,
  caller: Caller,
  changes: Partial<Exercise> = {},
): Promise<string> {
  return new ExerciseService(db).publish(caller, {...STOP_WITHOUT_A_LOOP, ...changes});
}

/** Starts an attempt through the API, `begunS` ago so that its log may already be that far. */
export async function startAttempt(
  server: TestServer,
  {agent}: SignedIn,
  exerciseId: string,
  begunS = 600,
): Promise<Made> {
  const [id, writerKey] = [randomUUID(), randomUUID()];
  await agent.put(`/api/attempts/${id}`).send({exerciseId, writerKey}).expect(200);
  await server.db.query(
    'update attempt set started_at = started_at - make_interval(secs => $2) where id = $1',
    [id, begunS],
  );
  return {id, writerKey, exerciseId, agent};
}

/** Sends one batch. */
export function sendBatch(
  {agent, id, writerKey}: Made,
  number: number,
  entries: readonly (LogEntry | object)[],
  throughTick = 6000,
) {
  return agent
    .post(`/api/attempts/${id}/batches`)
    .send({writerKey, number, throughTick, entries: [...entries]});
}
