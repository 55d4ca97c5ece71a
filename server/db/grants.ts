import {type Client, escapeIdentifier} from 'pg';

/** What the server's own user may do: read and write rows, and nothing to the tables themselves. */
export async function grantToServer(owner: Client, serverUser: string): Promise<void> {
  const user = escapeIdentifier(serverUser);
  for (const schema of ['public', 'pgboss']) {
    await owner.query(`grant usage on schema ${schema} to ${user}`);
    await owner.query(
      `grant select, insert, update, delete on all tables in schema ${schema} to ${user}`,
    );
    await owner.query(`grant execute on all functions in schema ${schema} to ${user}`);
  }
  // Which migrations ran is for the owner alone to say.
  await owner.query(`revoke insert, update, delete on migration from ${user}`);
}
