import {AppError} from '../../errors';

/** A place in a list of attempts, newest first. */
export interface Keyset {
  readonly startedAt: Date;
  readonly id: string;
}

const CURSOR = /^(\d{1,15})_([0-9a-f]{8}(?:-[0-9a-f]{4}){3}-[0-9a-f]{12})$/;

/** What the client passes back to read on; nothing secret. */
export function writeCursor({startedAt, id}: Keyset): string {
  return `${startedAt.getTime()}_${id}`;
}

export function readCursor(text: string): Keyset {
  const [, ms, id] = CURSOR.exec(text) ?? [];
  if (ms !== undefined && id !== undefined) return {startedAt: new Date(Number(ms)), id};
  throw new AppError('invalid-input', {
    errors: [
      {
        path: 'query.cursor',
        message: 'Take the cursor of the last reply as it is.',
        value: text,
      },
    ],
  });
}

/** `text` as a pattern that finds it anywhere, whatever signs it holds. */
export function containing(text: string): string {
  return `%${text.replace(/[\\%_]/g, '\\$&')}%`;
}
