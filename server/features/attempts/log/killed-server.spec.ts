import {type ChildProcess, spawn} from 'node:child_process';
import path from 'node:path';
import supertest from 'supertest';
import {passingLog} from '../../../demo/documents/stop-without-a-loop-logs';
import {scoreAttempt} from '../../../jobs/score-attempt';
import {
  type Made,
  publishExercise,
  sendBatch,
  startAttempt,
} from '../../../test-support/attempt-maker';
import {type SignedIn, tokenOf, useTestServer} from '../../../test-support/test-server';
import {testSettings} from '../../../test-support/test-settings';

/** A server in a process of its own, on the database of the spec. */
interface Program {
  readonly child: ChildProcess;
  readonly url: string;
}

describe('a server killed between batches', () => {
  const server = useTestServer();
  const children: ChildProcess[] = [];
  afterAll(() => {
    for (const child of children) child.kill('SIGKILL');
    return scoreAttempt.close?.();
  });

  /** Any free port: the program says which. */
  const startProgram = (): Promise<Program> => {
    const settings = testSettings(server().parts.config.databaseUrl, {PORT: '0'});
    const child = spawn(process.execPath, ['--import', 'tsx', path.resolve('server/main.ts')], {
      env: {...process.env, ...settings, LOG_LEVEL: 'info'},
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    children.push(child);
    return new Promise((resolve, reject) => {
      let said = '';
      const hear = (chunk: Buffer): void => {
        said += chunk.toString();
        const url = /"url":"([^"]+)"[^\n]*"listening"/.exec(said)?.[1];
        if (url !== undefined) resolve({child, url});
      };
      child.stdout.on('data', hear);
      child.stderr.on('data', hear);
      child.on('exit', () => reject(new Error(said)));
    });
  };
  /** The same person with the same session at another server. */
  const at = async ({url}: Program, {cookie}: SignedIn): Promise<Made['agent']> => {
    const agent = supertest.agent(url);
    agent.set('Cookie', cookie);
    const {headers} = await agent.get('/api/session').expect(200);
    return agent.set('X-XSRF-TOKEN', tokenOf(headers) ?? '');
  };

  it('leaves the log of the same acts undisturbed, once what had no answer is sent again', async () => {
    const trainee = await server().signedInAs('trainee');
    const exerciseId = await publishExercise(server(), trainee.caller);
    const made = await startAttempt(server(), trainee, exerciseId);
    const {entries, throughTick} = passingLog();
    const [first, second, ...rest] = entries.map((entry) => [entry]);
    if (!first || !second) throw new Error('a log of at least two acts is needed');

    const killed = await startProgram();
    const before = {...made, agent: await at(killed, trainee)};
    await sendBatch(before, 1, first, 1).expect(200);
    const unanswered = sendBatch(before, 2, second, throughTick).then(
      () => 'answered',
      () => 'cut off',
    );
    killed.child.kill('SIGKILL');
    await unanswered;

    const next = await startProgram();
    const after = {...made, agent: await at(next, trainee)};
    await sendBatch(after, 2, second, throughTick).expect(200);
    for (const [index, batch] of rest.entries())
      await sendBatch(after, index + 3, batch, throughTick).expect(200);
    const {organisationId} = trainee.caller;
    await scoreAttempt.run({organisationId, attemptId: made.id}, server().parts);

    const log = await trainee.agent.get(`/api/attempts/${made.id}/log`).expect(200);
    const {body} = await trainee.agent.get(`/api/attempts/${made.id}`).expect(200);
    expect(log.body.entries).toEqual([...entries]);
    // The hash was made by running the acts without any server.
    expect(body.result.hashAgrees).toBeTrue();
    expect(body.score).toBe(100);
  });
});
