import {inject, Injectable} from '@angular/core';
import {type FailureCode, toApiFailure} from '../../platform/api-failure';
import {type AskedStart} from '../../platform/person-database';
import {ExerciseApi} from '../exercise-api';
import {AttemptKeeper} from '../outbox/attempt-keeper';
import {Outbox} from '../outbox/outbox';

/** After these nobody knows whether the attempt was begun: the next try asks for the same one. */
const MAY_HAVE_BEGUN: readonly FailureCode[] = ['internal', 'offline', 'unavailable', 'unreadable'];

/** Starts attempts: the id is made and kept here first, so that a lost answer does no harm. */
@Injectable({providedIn: 'root'})
export class StartAttempt {
  private readonly api = inject(ExerciseApi);
  private readonly outbox = inject(Outbox);

  /** Resolves to the id of the attempt, which is then kept on this device. Throws ApiFailure. */
  async start(exerciseId: string): Promise<string> {
    const database = await this.outbox.database();
    const asked: AskedStart = (await database.get('starts', exerciseId)) ?? {
      exerciseId,
      attemptId: crypto.randomUUID(),
      writerKey: crypto.randomUUID(),
    };
    await database.put('starts', asked);
    const {attemptId, writerKey} = asked;
    try {
      const attempt = await this.api.start(attemptId, exerciseId, writerKey);
      await new AttemptKeeper(database, attemptId).save({
        id: attemptId,
        exerciseId,
        writerKey,
        document: attempt.exerciseDocument,
        seed: attempt.seed,
        ackedBatch: 0,
        throughTick: 0,
      });
    } catch (error) {
      const failure = toApiFailure(error);
      if (!MAY_HAVE_BEGUN.includes(failure.code)) await database.delete('starts', exerciseId);
      throw failure;
    }
    await database.delete('starts', exerciseId);
    return attemptId;
  }
}
