import {inject, Injectable} from '@angular/core';
import {openPersonDatabase} from '../../platform/person-database';
import {Session} from '../../session/session';
import {ExerciseApi} from '../exercise-api';
import {AttemptKeeper} from '../outbox/attempt-keeper';

/** Starts attempts: the id is made here, so that a lost answer does no harm. */
@Injectable({providedIn: 'root'})
export class StartAttempt {
  private readonly api = inject(ExerciseApi);
  private readonly session = inject(Session);

  /** Resolves to the id of the attempt, which is then kept on this device. */
  async start(exerciseId: string): Promise<string> {
    const attemptId = crypto.randomUUID();
    const writerKey = crypto.randomUUID();
    const attempt = await this.api.start(attemptId, exerciseId, writerKey);
    const database = await openPersonDatabase(this.session.me()?.id ?? 'nobody');
    await new AttemptKeeper(database, attemptId).save({
      id: attempt.id,
      exerciseId,
      writerKey,
      document: attempt.exerciseDocument,
      seed: attempt.seed,
      ackedBatch: 0,
      throughTick: 0,
    });
    database.close();
    return attemptId;
  }
}
