import {type DBSchema, type IDBPDatabase, openDB} from 'idb';
import {type Batch} from '#shared/attempts/attempt';
import {type ExerciseToRun} from '#shared/exercises/exercise';
import {type LogEntry} from '#sim-core/index';

/** An attempt as this device knows it. */
export interface KeptAttempt {
  readonly id: string;
  readonly exerciseId: string;
  readonly writerKey: string;
  readonly document: ExerciseToRun;
  readonly seed: number;
  /** Number of the last batch that the server has. */
  readonly ackedBatch: number;
  /** How far the run was shown here [ticks]. */
  readonly throughTick: number;
}

/** A batch is fixed before it is first sent: a repetition is the same to the letter. */
export interface KeptBatch {
  readonly attemptId: string;
  readonly number: number;
  readonly batch: Batch;
}

/** An entry that is in no batch yet. */
export interface WaitingEntry {
  readonly attemptId: string;
  readonly n: number;
  readonly entry: LogEntry;
}

export interface PersonSchema extends DBSchema {
  attempts: {key: string; value: KeptAttempt};
  batches: {key: [string, number]; value: KeptBatch};
  waiting: {key: [string, number]; value: WaitingEntry};
}
export type PersonDatabase = IDBPDatabase<PersonSchema>;

/** Opens this person's database on this device; another person's entries are not in it. */
export function openPersonDatabase(personId: string): Promise<PersonDatabase> {
  return openDB<PersonSchema>(`evenspan-${personId}`, 1, {
    upgrade(database) {
      database.createObjectStore('attempts', {keyPath: 'id'});
      database.createObjectStore('batches', {keyPath: ['attemptId', 'number']});
      database.createObjectStore('waiting', {keyPath: ['attemptId', 'n']});
    },
  });
}
