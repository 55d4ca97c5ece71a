import {randomUUID} from 'node:crypto';
import {type ExerciseSummary, ExerciseToRun} from '#shared/exercises/exercise';
import {STOP_WITHOUT_A_LOOP} from '../../demo/documents/stop-without-a-loop';
import {passingLog, untouchedLog} from '../../demo/documents/stop-without-a-loop-logs';
import {scoreAttempt} from '../../jobs/score-attempt';
import {publishExercise, sendBatch, startAttempt} from '../../test-support/attempt-maker';
import {type SignedIn, useTestServer} from '../../test-support/test-server';
import {ExerciseService} from './exercise-service';

describe('the exercises', () => {
  const server = useTestServer();
  let trainee: SignedIn;
  let instructor: SignedIn;
  let exerciseId: string;

  beforeAll(async () => {
    trainee = await server().signedInAs('trainee');
    instructor = await server().signedInAs('instructor', trainee.caller.organisationId);
    exerciseId = await publishExercise(server(), instructor.caller);
  });
  afterAll(() => scoreAttempt.close?.());

  const list = async ({agent}: SignedIn): Promise<ExerciseSummary[]> =>
    (await agent.get('/api/exercises').expect(200)).body as ExerciseSummary[];

  describe('refuse', () => {
    it("to be read when they are not there, archived, or another organisation's", async () => {
      const stranger = await server().signedInAs('instructor');
      const foreign = await publishExercise(server(), stranger.caller);
      const archived = await publishExercise(server(), instructor.caller, {number: 50});
      await server().db.query("update exercise set state = 'archived' where id = $1", [archived]);

      for (const id of [randomUUID(), foreign, archived]) {
        const {body} = await trainee.agent.get(`/api/exercises/${id}`).expect(404);
        expect(body.code).toBe('not-found');
      }
      expect((await list(stranger)).map(({id}) => id) as string[]).toEqual([foreign]);
      expect((await list(trainee)).map(({number}) => number)).not.toContain(50);
    });

    it('to have a version changed, in the database itself', async () => {
      await expectAsync(
        server().db.query("update exercise_version set title = 'x' where exercise_id = $1", [
          exerciseId,
        ]),
      ).toBeRejectedWithError(/never changed/);
    });
  });

  describe('answer', () => {
    it('by their number, to one who has tried none', async () => {
      await publishExercise(server(), instructor.caller, {number: 3});

      const all = await list(instructor);

      expect(all.map(({number}) => number)).toEqual([3, 10]);
      expect(all[1]?.mine).toEqual({
        count: 0,
        best: null,
        hasPassed: false,
        openAttemptId: null,
      });
    });

    it('with what is run, without the words of hints and without the solution', async () => {
      const {text, body} = await trainee.agent.get(`/api/exercises/${exerciseId}`).expect(200);

      expect(ExerciseToRun.parse(body.exercise).hintCosts).toEqual([5]);
      expect(body.summary.id).toBe(exerciseId);
      expect(text).not.toContain(STOP_WITHOUT_A_LOOP.hints[0]?.text);
      expect(text).not.toContain('odelSolution');
    });

    it('how the caller stands: tries, best, passed, and the attempt that is open', async () => {
      const {caller} = trainee;
      for (const {entries, throughTick} of [untouchedLog(), passingLog(), untouchedLog()]) {
        const made = await startAttempt(server(), trainee, exerciseId);
        await sendBatch(made, 1, entries, throughTick).expect(200);
        const key = {organisationId: caller.organisationId, attemptId: made.id};
        await scoreAttempt.run(key, server().parts);
      }
      await startAttempt(server(), trainee, exerciseId, 500);
      const {id} = await startAttempt(server(), trainee, exerciseId, 10);

      const mine = (await list(trainee)).find((each) => each.number === 10)?.mine;

      expect(mine).toEqual({count: 5, best: 100, hasPassed: true, openAttemptId: id});
    });

    it('with the newest version, which is made only when something changed', async () => {
      const numbered = {...STOP_WITHOUT_A_LOOP, number: 7};
      const exercises = new ExerciseService(server().db);
      const publish = (change: object) =>
        exercises.publish(instructor.caller, {...numbered, ...change});

      const ids = await Promise.all([publish({}), publish({}), publish({})]);
      await publish({title: 'Stop, second wording'});
      await publish({title: 'Stop, second wording'});

      const rows: {number: number}[] = await server().db.query(
        'select number from exercise_version where exercise_id = $1 order by number',
        [ids[0]],
      );
      expect(new Set(ids).size).toBe(1);
      expect(rows.map(({number}) => number)).toEqual([1, 2]);
      const {body} = await trainee.agent.get(`/api/exercises/${ids[0]}`).expect(200);
      expect(body.exercise.title).toBe('Stop, second wording');
      await server().db.query("update exercise set state = 'archived' where id = $1", [ids[0]]);
    });
  });
});
