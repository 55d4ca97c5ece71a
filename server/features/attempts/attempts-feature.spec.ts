import {randomUUID} from 'node:crypto';
import {Attempt, type AttemptSummary} from '#shared/attempts/attempt';
import {STOP_WITHOUT_A_LOOP} from '../../demo/documents/stop-without-a-loop';
import {publishExercise, sendBatch, startAttempt} from '../../test-support/attempt-maker';
import {type Agent, type SignedIn, useTestServer} from '../../test-support/test-server';

interface Page {
  readonly items: AttemptSummary[];
  readonly nextCursor: string | null;
}

describe('attempts', () => {
  const server = useTestServer();
  let trainee: SignedIn;
  let colleague: SignedIn;
  let instructor: SignedIn;
  let stranger: SignedIn;
  let exerciseId: string;

  beforeAll(async () => {
    trainee = await server().signedInAs('trainee');
    const {organisationId} = trainee.caller;
    colleague = await server().signedInAs('trainee', organisationId);
    instructor = await server().signedInAs('instructor', organisationId);
    stranger = await server().signedInAs('instructor');
    exerciseId = await publishExercise(server(), instructor.caller);
  });

  const start = ({agent}: SignedIn, id: string, body: object) =>
    agent.put(`/api/attempts/${id}`).send(body);
  const draft = () => ({exerciseId, writerKey: randomUUID()});

  describe('being started', () => {
    describe('refuses', () => {
      it('an exercise that is not there, not published, or of another organisation', async () => {
        const foreign = await publishExercise(server(), stranger.caller);
        const archived = await publishExercise(server(), instructor.caller, {number: 99});
        await server().db.query("update exercise set state = 'archived' where id = $1", [archived]);

        for (const id of [randomUUID(), foreign, archived]) {
          const {body} = await start(trainee, randomUUID(), {
            exerciseId: id,
            writerKey: randomUUID(),
          }).expect(404);
          expect(body.code).toBe('not-found');
        }
      });

      it("an id that is another's, in the own organisation or not", async () => {
        const {id} = await startAttempt(server(), trainee, exerciseId);
        const foreign = await publishExercise(server(), stranger.caller);

        await start(colleague, id, draft()).expect(404);
        await start(stranger, id, {exerciseId: foreign, writerKey: randomUUID()}).expect(404);
      });

      it('the same id with another writer or for another exercise', async () => {
        const made = await startAttempt(server(), trainee, exerciseId);
        const other = await publishExercise(server(), instructor.caller, {number: 98});

        const writer = await start(trainee, made.id, draft()).expect(409);
        const exercise = await start(trainee, made.id, {
          exerciseId: other,
          writerKey: made.writerKey,
        }).expect(409);

        expect([writer.body.code, exercise.body.code]).toEqual(['writer-changed', 'in-use']);
      });

      it('a try more than the exercise allows, also of two that start at once', async () => {
        const twice = await publishExercise(server(), instructor.caller, {
          number: 97,
          limits: {...STOP_WITHOUT_A_LOOP.limits, tries: 2},
        });
        const made = await startAttempt(server(), trainee, twice);

        const replies = await Promise.all(
          [1, 2, 3].map(() =>
            start(trainee, randomUUID(), {exerciseId: twice, writerKey: randomUUID()}),
          ),
        );

        expect(replies.map(({status}) => status).sort()).toEqual([200, 403, 403]);
        const {id, writerKey} = made;
        await start(trainee, id, {exerciseId: twice, writerKey}).expect(200); // no new one
        await startAttempt(server(), colleague, twice);
      });

      it('an id and a key that are none', async () => {
        await start(trainee, 'first', draft()).expect(400);
        await start(trainee, randomUUID(), {exerciseId, writerKey: 'key'}).expect(400);
      });
    });

    describe('answers', () => {
      it('with the exercise as it is run and the seed of practice', async () => {
        const {body} = await start(trainee, randomUUID(), draft()).expect(200);

        const attempt = Attempt.parse(body);
        expect(attempt.seed).toBe(STOP_WITHOUT_A_LOOP.scenario.seed);
        expect([attempt.state, attempt.lastBatch, attempt.throughTick]).toEqual(['running', 0, 0]);
        expect(attempt.exerciseDocument.hintCosts).toEqual(
          STOP_WITHOUT_A_LOOP.hints.map(({cost}) => cost),
        );
        expect(JSON.stringify(body)).not.toContain(STOP_WITHOUT_A_LOOP.hints[0]?.text);
      });

      it('the same when it is started again, one by one or at once', async () => {
        const [id, body] = [randomUUID(), draft()];

        const replies = await Promise.all([1, 2, 3].map(() => start(trainee, id, body)));
        const again = await start(trainee, id, body).expect(200);

        for (const reply of replies) expect(reply.body).toEqual(again.body);
      });

      it('by the version it was started with, whatever is published later', async () => {
        const changing = await publishExercise(server(), instructor.caller, {number: 96});
        const made = await startAttempt(server(), trainee, changing);
        await publishExercise(server(), instructor.caller, {
          number: 96,
          title: 'Another title',
          touch: {settings: [], commands: []},
        });

        const {body} = await trainee.agent.get(`/api/attempts/${made.id}`).expect(200);
        await sendBatch(made, 1, [{n: 1, tick: 0, kind: 'set', set: {kp: 0.1}}]).expect(200);

        expect(body.exerciseDocument.title).toBe(STOP_WITHOUT_A_LOOP.title);
      });
    });
  });

  describe('being taken over', () => {
    it('refuses when it is over, and answers the same key again', async () => {
      const made = await startAttempt(server(), trainee, exerciseId);
      const takeOver = (writerKey: string) =>
        trainee.agent.put(`/api/attempts/${made.id}/writer`).send({writerKey});
      await sendBatch(made, 1, [{n: 1, tick: 0, kind: 'end', hash: '0'.repeat(16)}]).expect(200);

      const {body} = await takeOver(randomUUID()).expect(422);

      expect(body.code).toBe('attempt-over');
      await takeOver(made.writerKey).expect(200);
    });
  });

  describe('being listed', () => {
    let mine: SignedIn;
    let ids: string[];

    beforeAll(async () => {
      mine = await server().signedInAs('trainee', trainee.caller.organisationId);
      ids = [];
      await startAttempt(server(), trainee, exerciseId);
      for (let n = 0; n < 5; n++)
        ids.unshift((await startAttempt(server(), mine, exerciseId, 100 - n)).id);
      // Two of one moment: the id decides.
      await server().db.query(
        'update attempt set started_at = (select started_at from attempt where id = $1) where id = $2',
        [ids[1], ids[2]],
      );
      if ((ids[1] ?? '') < (ids[2] ?? '')) [ids[1], ids[2]] = [ids[2] ?? '', ids[1] ?? ''];
      await server().db.query("update person set name = '100% _Ann\\' where id = $1", [
        mine.caller.personId,
      ]);
    });

    const list = async (agent: Agent, path: string, query: object): Promise<Page> => {
      const {body} = await agent.get(`/api/${path}`).query(query).expect(200);
      return body as Page;
    };

    describe('refuses', () => {
      it('a cursor, a limit or an exercise that is none', async () => {
        for (const query of [
          {cursor: 'first'},
          {cursor: `1_${randomUUID()}' or true`},
          {limit: 0},
          {limit: 101},
          {exerciseId: '1'},
        ]) {
          const {body} = await mine.agent.get('/api/attempts/mine').query(query).expect(400);
          expect(body.errors[0].path).toBe(`query.${Object.keys(query)[0] ?? ''}`);
        }
      });
    });

    describe('answers', () => {
      it('page by page, newest first, each once', async () => {
        const seen: string[] = [];
        let cursor: string | null = null;
        do {
          const page: Page = await list(mine.agent, 'attempts/mine', {
            limit: 2,
            ...(cursor !== null && {cursor}),
          });
          seen.push(...page.items.map(({id}) => id));
          cursor = page.nextCursor;
        } while (cursor !== null);

        expect(seen).toEqual(ids);
      });

      it('nobody else among the own, everybody of the organisation for the instructor', async () => {
        const own = await list(colleague.agent, 'attempts/mine', {limit: 100});
        const all = await list(instructor.agent, 'attempts', {limit: 100});
        const foreign = await list(stranger.agent, 'attempts', {});

        expect(own.items.every(({person}) => person.id === colleague.caller.personId)).toBeTrue();
        const people = new Set<string>(all.items.map(({person}) => person.id));
        expect(people).toContain(mine.caller.personId);
        expect(people).toContain(trainee.caller.personId);
        expect(foreign.items).toEqual([]);
      });

      it('what is looked for in names and titles, signs of patterns taken as they are', async () => {
        const count = async (q: string) =>
          (await list(instructor.agent, 'attempts', {q, limit: 100})).items.length;

        expect(await count('0% _ANN\\')).toBe(5);
        expect(await count('0%_Ann')).toBe(0);
        expect(await count('___% _Ann')).toBe(0);
        expect(await count('WITHOUT A LOOP')).toBeGreaterThan(5);
      });

      it('those of one exercise', async () => {
        const other = await publishExercise(server(), instructor.caller, {number: 95});
        const {id} = await startAttempt(server(), mine, other, 50_000);

        const page = await list(instructor.agent, 'attempts', {exerciseId: other});

        expect(page.items.map((each) => each.id) as string[]).toEqual([id]);
        await server().db.query('delete from attempt where id = $1', [id]);
      });

      it('a table for other programs, whose texts are no formulas', async () => {
        const joker = await server().signedInAs('trainee', trainee.caller.organisationId);
        await startAttempt(server(), joker, exerciseId);
        await server().db.query(`update person set name = '=1+1,"x"' where id = $1`, [
          joker.caller.personId,
        ]);

        const {text, headers} = await instructor.agent.get('/api/attempts.csv').expect(200);

        expect(headers['content-type']).toBe('text/csv; charset=utf-8');
        expect(headers['content-disposition']).toContain('attempts.csv');
        const [head, ...rows] = text.trimEnd().split('\r\n');
        expect(head).toMatch(/^exercise number,exercise,person,state,/);
        expect(rows.length).toBe(
          (await list(instructor.agent, 'attempts', {limit: 100})).items.length,
        );
        expect(rows.filter((row) => row.includes(`,"'=1+1,""x""",`)).length).toBe(1);
      });
    });
  });
});
