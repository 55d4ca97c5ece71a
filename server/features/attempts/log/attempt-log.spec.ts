import {randomUUID} from 'node:crypto';
import {type LogEntry} from '#sim-core/index';
import {type Batch} from '#shared/attempts/attempt';
import {passingLog} from '../../../demo/documents/stop-without-a-loop-logs';
import {type AppError} from '../../../errors';
import {
  type Made,
  publishExercise,
  sendBatch,
  startAttempt,
} from '../../../test-support/attempt-maker';
import {type SignedIn, useTestServer} from '../../../test-support/test-server';
import {AttemptLogService} from './attempt-log-service';
import {AttemptReadService} from '../attempt-read-service';

const pause = (n: number, tick: number): LogEntry => ({n, tick, kind: 'pause'});
const end = (n: number, tick: number): LogEntry => ({n, tick, kind: 'end', hash: '0'.repeat(16)});

describe('the log of an attempt', () => {
  const server = useTestServer();
  let trainee: SignedIn;
  let exerciseId: string;
  let made: Made;

  beforeAll(async () => {
    trainee = await server().signedInAs('trainee');
    exerciseId = await publishExercise(server(), trainee.caller);
  });
  beforeEach(async () => (made = await startAttempt(server(), trainee, exerciseId)));

  const stored = async (id = made.id) =>
    (await trainee.agent.get(`/api/attempts/${id}/log`).expect(200)).body as {
      entries: LogEntry[];
      lastBatch: number;
      throughTick: number;
    };
  const jobsOf = async (id: string): Promise<number> => {
    const rows: unknown[] = await server().db.query(
      "select id from pgboss.job where name = 'score-attempt' and data ->> 'attemptId' = $1",
      [id],
    );
    return rows.length;
  };

  describe('refuses', () => {
    it('a gap, and says which batch it wants', async () => {
      await sendBatch(made, 1, [pause(1, 0)]).expect(200);

      const {body} = await sendBatch(made, 3, [pause(2, 0)]).expect(409);

      expect([body.code, body.wanted]).toEqual(['batch-missing', 2]);
      expect((await stored()).lastBatch).toBe(1);
    });

    it('a number it has with another content', async () => {
      await sendBatch(made, 1, [pause(1, 5)]).expect(200);

      const {body} = await sendBatch(made, 1, [pause(1, 6)]).expect(409);

      expect(body.code).toBe('batch-differs');
      expect((await stored()).entries).toEqual([pause(1, 5)]);
    });

    it('the whole batch for one entry, with its place, its value and what is allowed', async () => {
      const locked = {n: 2, tick: 10, kind: 'set', set: {tiS: 0.5}};

      const {body} = await sendBatch(made, 1, [pause(1, 5), locked]).expect(422);

      expect(body.code).toBe('entry-refused');
      expect(body.errors).toEqual([
        {
          path: 'body.entries.1.set.tiS',
          message: jasmine.stringContaining('stopHoldGain'),
          value: 0.5,
        },
      ]);
      expect(await stored()).toEqual({entries: [], lastBatch: 0, throughTick: 0});
    });

    it('a tick before the last one stored, and an n that does not follow', async () => {
      await sendBatch(made, 1, [pause(1, 50)]).expect(200);

      const early = await sendBatch(made, 2, [pause(2, 49)]).expect(422);
      const gap = await sendBatch(made, 2, [pause(3, 50)]).expect(422);

      expect(early.body.errors[0].path).toBe('body.entries.0.tick');
      expect(gap.body.errors[0].path).toBe('body.entries.0.n');
    });

    it('ticks that nobody can have lived through yet', async () => {
      const fresh = await startAttempt(server(), trainee, exerciseId, 0);

      const {body} = await sendBatch(fresh, 1, [pause(1, 0)], 30_000).expect(422);

      expect(body.code).toBe('too-fast');
      await sendBatch(fresh, 1, [pause(1, 0)], 500).expect(200);
    });

    it('anything once the attempt is over', async () => {
      await sendBatch(made, 1, [end(1, 10)]).expect(200);

      const batch = await sendBatch(made, 2, [pause(2, 10)]).expect(422);
      const beat = await made.agent
        .post(`/api/attempts/${made.id}/beats`)
        .send({writerKey: made.writerKey, throughTick: 20})
        .expect(422);

      expect([batch.body.code, beat.body.code]).toEqual(['attempt-over', 'attempt-over']);
    });

    it('a writer whose attempt was taken over, by batch and by beat', async () => {
      const writerKey = randomUUID();
      const at = `/api/attempts/${made.id}`;
      await made.agent.put(`${at}/writer`).send({writerKey}).expect(200);

      const batch = await sendBatch(made, 1, [pause(1, 0)]).expect(409);
      const beat = await made.agent
        .post(`${at}/beats`)
        .send({writerKey: made.writerKey, throughTick: 1})
        .expect(409);

      expect([batch.body.code, beat.body.code]).toEqual(['writer-changed', 'writer-changed']);
      await sendBatch({...made, writerKey}, 1, [pause(1, 0)]).expect(200);
    });

    it('what is no batch: no entries, too many, an unknown kind, a broken hash', async () => {
      const many = Array.from({length: 501}, (each, index) => pause(index + 1, 0));
      const wrong: object[][] = [
        [],
        many,
        [{n: 1, tick: 0, kind: 'undo'}],
        [{n: 1, tick: 0.5, kind: 'pause'}],
        [{n: 1, tick: 0, kind: 'end', hash: 'x'}],
        [{n: 1, tick: 0, kind: 'pause', score: 100}],
      ];

      for (const entries of wrong) {
        const {body} = await sendBatch(made, 1, entries).expect(400);
        expect(body.errors[0].path).toMatch(/^body\.entries/);
      }
      expect((await stored()).lastBatch).toBe(0);
    });

    it('a batch beyond 64 kB', async () => {
      const large = {n: 1, tick: 0, kind: 'set', set: {kp: 'x'.repeat(70_000)}};

      const {body} = await sendBatch(made, 1, [large]).expect(413);

      expect(body.code).toBe('body-too-large');
    });
  });

  describe('answers', () => {
    it('with the number stored, and keeps the entries as they came', async () => {
      const {entries, throughTick} = passingLog();
      await sendBatch(made, 1, entries.slice(0, 2), 1300).expect(200, {
        lastBatch: 1,
        state: 'running',
      });
      await sendBatch(made, 2, entries.slice(2), throughTick).expect(200, {
        lastBatch: 2,
        state: 'handed-in',
      });

      expect(await stored()).toEqual({entries: [...entries], lastBatch: 2, throughTick});
    });

    it('the same to a batch that comes again, and stores nothing', async () => {
      await sendBatch(made, 1, [pause(1, 5)], 100).expect(200);

      await sendBatch(made, 1, [pause(1, 5)], 200).expect(200, {lastBatch: 1, state: 'running'});

      expect(await stored()).toEqual({entries: [pause(1, 5)], lastBatch: 1, throughTick: 100});
    });

    it('two that are the same and come at once, and stores one', async () => {
      for (const tries of [2, 5]) {
        const each = await startAttempt(server(), trainee, exerciseId);
        const replies = await Promise.all(
          Array.from({length: tries}, () => sendBatch(each, 1, [end(1, 5)])),
        );

        expect(replies.map(({status}) => status)).toEqual(replies.map(() => 200));
        expect((await stored(each.id)).entries).toEqual([end(1, 5)]);
        expect(await jobsOf(each.id)).toBe(1);
      }
    });

    it('one of two that differ and come at once', async () => {
      const replies = await Promise.all([5, 6].map((tick) => sendBatch(made, 1, [pause(1, tick)])));

      expect(replies.map(({status}) => status).sort()).toEqual([200, 409]);
      expect((await stored()).entries.length).toBe(1);
    });

    it('an end that comes again after it was handed in', async () => {
      await sendBatch(made, 1, [end(1, 10)]).expect(200);

      await sendBatch(made, 1, [end(1, 10)]).expect(200, {lastBatch: 1, state: 'handed-in'});

      expect(await jobsOf(made.id)).toBe(1);
    });

    it('a beat, and stores its tick, but not each second and never backwards', async () => {
      const beat = (throughTick: number) =>
        made.agent
          .post(`/api/attempts/${made.id}/beats`)
          .send({writerKey: made.writerKey, throughTick});
      const later = () =>
        server().db.query("update attempt set beat_at = beat_at - interval '10 s' where id = $1", [
          made.id,
        ]);

      await beat(1000).expect(200, {nextBeatS: 10});
      await beat(1100).expect(200);
      expect((await stored()).throughTick).toBe(1000);
      await later();
      await beat(2000).expect(200);
      await later();
      await beat(1500).expect(200);

      expect((await stored()).throughTick).toBe(2000);
    });
  });

  describe('when the server dies', () => {
    /** Everything up to the commit is done, then the connection is gone. */
    const dying = () => {
      const jobs = {send: () => Promise.reject(new Error('killed'))};
      const parts = {...server().parts, jobs: jobs as never};
      return new AttemptLogService(parts, new AttemptReadService(server().db));
    };

    it('while an end is stored, leaves neither a batch nor a closed attempt, and takes it again', async () => {
      const batch: Batch = {
        writerKey: made.writerKey,
        number: 1,
        throughTick: 10,
        entries: [{n: 1, tick: 10, kind: 'end', hash: '0'.repeat(16)}],
      };
      await expectAsync(dying().addBatch(trainee.caller, made.id, batch)).toBeRejectedWithError(
        'killed',
      );
      expect(await stored()).toEqual({entries: [], lastBatch: 0, throughTick: 0});

      await sendBatch(made, 1, batch.entries, 10).expect(200);

      expect(await jobsOf(made.id)).toBe(1);
    });

    it('and every batch is sent twice, has the log of the same acts undisturbed', async () => {
      const {entries, throughTick} = passingLog();
      for (const [index, entry] of entries.entries()) {
        for (let times = 0; times < 2; times++)
          await sendBatch(made, index + 1, [entry], Math.max(entry.tick, 1)).expect(200);
      }

      expect((await stored()).entries).toEqual([...entries]);
      expect((await stored()).throughTick).toBe(throughTick);
    });
  });

  it('goes by the clock it is given', async () => {
    const log = (now: Date) =>
      new AttemptLogService(
        {...server().parts, now: () => now},
        new AttemptReadService(server().db),
      );
    const fresh = await startAttempt(server(), trainee, exerciseId, 0);
    const batch: Batch = {
      writerKey: fresh.writerKey,
      number: 1,
      throughTick: 30_000,
      entries: [{n: 1, tick: 1, kind: 'pause'}],
    };
    const began = Date.now();

    const refused: unknown = await log(new Date(began + 10_000))
      .addBatch(trainee.caller, fresh.id, batch)
      .catch((error: unknown) => error);
    const taken = await log(new Date(began + 15_000)).addBatch(trainee.caller, fresh.id, batch);

    expect((refused as AppError).code).toBe('too-fast'); // 205 s allowed, 300 s sent
    expect(taken.lastBatch).toBe(1);
  });
});
