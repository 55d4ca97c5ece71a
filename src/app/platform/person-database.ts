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
  /** The server's log when this device took the attempt over; what is written here comes after it. */
  readonly base?: readonly LogEntry[];
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

/** An attempt asked for, until the server has answered: another try asks for the very same. */
export interface AskedStart {
  readonly exerciseId: string;
  readonly attemptId: string;
  readonly writerKey: string;
}

/** What this device had of an attempt that another device went on with. Never sent, never thrown away. */
export interface SetAside {
  readonly attemptId: string;
  readonly setAsideAt: string;
  readonly entries: readonly LogEntry[];
}

export interface PersonSchema extends DBSchema {
  attempts: {key: string; value: KeptAttempt};
  batches: {key: [string, number]; value: KeptBatch};
  waiting: {key: [string, number]; value: WaitingEntry};
  starts: {key: string; value: AskedStart};
  setAside: {key: number; value: SetAside};
}
export type PersonDatabase = IDBPDatabase<PersonSchema>;

/** Opens this person's database on this device; another person's entries are not in it. */
export function openPersonDatabase(personId: string): Promise<PersonDatabase> {
  return openDB<PersonSchema>(`evenspan-${personId}`, 2, {
    upgrade(database, oldVersion) {
      if (oldVersion < 1) {
        database.createObjectStore('attempts', {keyPath: 'id'});
        database.createObjectStore('batches', {keyPath: ['attemptId', 'number']});
        database.createObjectStore('waiting', {keyPath: ['attemptId', 'n']});
      }
      if (oldVersion < 2) {
        database.createObjectStore('starts', {keyPath: 'exerciseId'});
        database.createObjectStore('setAside', {autoIncrement: true});
      }
    },
  });
}
