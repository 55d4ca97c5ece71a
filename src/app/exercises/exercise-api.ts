import {inject, Injectable} from '@angular/core';
import {
  type Attempt,
  AttemptId,
  type AttemptState,
  type Batch,
  listOwnAttempts,
  readAttempt,
  readAttemptLog,
  sendBatch,
  sendBeat,
  startAttempt,
  takeOverAttempt,
} from '#shared/attempts/attempt';
import {
  ExerciseId,
  type ExerciseSummary,
  type ExerciseToRun,
  listExercises,
  readExercise,
} from '#shared/exercises/exercise';
import {ApiCaller} from '../platform/api-caller';

/** The calls around exercises and attempts. */
@Injectable({providedIn: 'root'})
export class ExerciseApi {
  private readonly api = inject(ApiCaller);

  list(): Promise<ExerciseSummary[]> {
    return this.api.call(listExercises, {});
  }

  read(exerciseId: string): Promise<{summary: ExerciseSummary; exercise: ExerciseToRun}> {
    return this.api.call(readExercise, {params: {exerciseId: ExerciseId.parse(exerciseId)}});
  }

  start(attemptId: string, exerciseId: string, writerKey: string): Promise<Attempt> {
    return this.api.call(startAttempt, {
      params: {attemptId: AttemptId.parse(attemptId)},
      body: {exerciseId: ExerciseId.parse(exerciseId), writerKey},
    });
  }

  attempt(attemptId: string): Promise<Attempt> {
    return this.api.call(readAttempt, {params: {attemptId: AttemptId.parse(attemptId)}});
  }

  log(attemptId: string) {
    return this.api.call(readAttemptLog, {params: {attemptId: AttemptId.parse(attemptId)}});
  }

  takeOver(attemptId: string, writerKey: string): Promise<Attempt> {
    return this.api.call(takeOverAttempt, {
      params: {attemptId: AttemptId.parse(attemptId)},
      body: {writerKey},
    });
  }

  sendBatch(attemptId: string, batch: Batch): Promise<{lastBatch: number; state: AttemptState}> {
    return this.api.call(sendBatch, {params: {attemptId: AttemptId.parse(attemptId)}, body: batch});
  }

  sendBeat(
    attemptId: string,
    writerKey: string,
    throughTick: number,
  ): Promise<{nextBeatS: number}> {
    return this.api.call(sendBeat, {
      params: {attemptId: AttemptId.parse(attemptId)},
      body: {writerKey, throughTick},
    });
  }

  async ownAttempts(exerciseId: string) {
    const page = await this.api.call(listOwnAttempts, {
      query: {exerciseId: ExerciseId.parse(exerciseId), limit: 20},
    });
    return page.items;
  }
}
