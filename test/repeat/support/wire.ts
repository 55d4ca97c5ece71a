import {Client} from 'pg';
import {type LogEntry} from '#sim-core/index';
import {Batch} from '#shared/attempts/attempt';
import {makeEmptyDatabase} from '../../../server/test-support/test-database';
import {type Draws} from './draws';

/** Most entries the page sends in one batch (shared/attempts/attempt.ts). */
const MOST_ENTRIES = 500;
const WRITER = '0198a000-0000-7000-8000-000000000001';

/** A document and its log, as the replay takes them. */
export interface Sent {
  readonly document: unknown;
  readonly log: readonly LogEntry[];
  readonly throughTick: number;
}

interface Row {
  readonly place: number;
  readonly document: unknown;
  readonly entries: readonly LogEntry[];
}

/**
 * Sends each log as the page does, in batches of JSON that the schema of the wire takes, keeps them in a column
 * of the type that the server's table has, and reads them back.
 */
export async function throughTheWire(sent: readonly Sent[], draws: Draws): Promise<Sent[]> {
  const database = await makeEmptyDatabase();
  const client = new Client({connectionString: database.url});
  await client.connect();
  try {
    await client.query(
      'create temp table batch (place integer, number integer, document jsonb, entries jsonb)',
    );
    const batches = sent.flatMap(({document, log, throughTick}, place) =>
      batchesOf(log, throughTick, draws).map((batch) => ({place, document, batch})),
    );
    await client.query(
      `insert into batch
        select place, number, document::jsonb, entries::jsonb
        from unnest($1::integer[], $2::integer[], $3::text[], $4::text[])
          as given(place, number, document, entries)`,
      [
        batches.map(({place}) => place),
        batches.map(({batch}) => batch.number),
        batches.map(({document}) => JSON.stringify(document)),
        batches.map(({batch}) => JSON.stringify(batch.entries)),
      ],
    );
    const {rows} = await client.query<Row>(
      'select place, document, entries from batch order by place, number',
    );
    return sent.map(({throughTick}, place) => {
      const own = rows.filter((row) => row.place === place);
      return {document: own[0]!.document, log: own.flatMap(({entries}) => entries), throughTick};
    });
  } finally {
    await client.end();
    await database.drop();
  }
}

/** The log in batches of any size, each through JSON and the schema. */
function batchesOf(log: readonly LogEntry[], throughTick: number, draws: Draws): Batch[] {
  const batches: Batch[] = [];
  for (let from = 0; from < log.length;) {
    const entries = log.slice(from, from + draws.pick([1, 3, 20, MOST_ENTRIES]));
    from += entries.length;
    const body = {writerKey: WRITER, number: batches.length + 1, throughTick, entries};
    batches.push(Batch.parse(JSON.parse(JSON.stringify(body))));
  }
  return batches;
}
