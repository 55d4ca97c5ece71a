import {v7} from 'uuid';

/** A new row's id: uuid v7, so that rows sort by when they were made. */
export function newId(): string {
  return v7();
}
