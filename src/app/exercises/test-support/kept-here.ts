import {deleteDB} from 'idb';
import {type LogEntry} from '#sim-core/index';
import {type KeptAttempt} from '../../platform/person-database';
import {holdAttempt} from '../outbox/attempt-lock';
import {type AttemptServer} from './attempt-server';

const realSetTimeout = setTimeout.bind(globalThis); // also while a spec holds the clock
const names: string[] = [];

/** A person's own database of one spec. */
export function aPersonId(): string {
  const personId = crypto.randomUUID();
  names.push(`evenspan-${personId}`);
  return personId;
}

/** Removes what the specs kept; connections that are still open go first. */
export async function dropDatabases(): Promise<void> {
  await Promise.all(names.splice(0).map((name) => deleteDB(name, {blocked: () => undefined})));
}

/** What this device knows of an attempt that was begun here. */
export function aKeptAttempt(server: AttemptServer): KeptAttempt {
  return {
    id: server.attemptId,
    exerciseId: server.exerciseId,
    writerKey: server.writerKey,
    document: server.document,
    seed: server.document.scenario.seed,
    ackedBatch: 0,
    throughTick: 0,
  };
}

export function anAnswer(n: number, text = 'yes'): LogEntry {
  return {n, tick: 10 * n, kind: 'answer', question: 0, answer: text};
}

/** Waits for something that databases and promises bring about, not the clock. */
export async function until(isSo: () => boolean | Promise<boolean>): Promise<void> {
  for (let look = 0; look < 600; look++) {
    if (await isSo()) return;
    await new Promise((resolve) => realSetTimeout(resolve, 5));
  }
  throw new Error(`never came true: ${isSo.toString()}`);
}

/** Gives databases and promises time to do what they would, to see that nothing happens. */
export function aWhile(): Promise<void> {
  return new Promise((resolve) => realSetTimeout(resolve, 60));
}

/** Waits until this tab has let an attempt go, with all that was still being written. */
export async function untilFree(attemptId: string): Promise<void> {
  await until(async () => {
    const letGo = await holdAttempt(attemptId);
    letGo?.();
    return letGo !== null;
  });
}
