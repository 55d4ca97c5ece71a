import {type Entry} from '#shared/attempts/attempt';
import {type Caller} from '../caller';
import {newId} from '../db/new-id';
import {AttemptLogService} from '../features/attempts/log/attempt-log-service';
import {AttemptReadService} from '../features/attempts/attempt-read-service';
import {AttemptService} from '../features/attempts/attempt-service';
import {ExerciseService} from '../features/exercises/exercise-service';
import {PeopleService} from '../features/people/people-service';
import {makeJobSender} from '../jobs/boss';
import {type DemoParts, type DemoStep} from './demo-step';
import {STOP_WITHOUT_A_LOOP} from './documents/stop-without-a-loop';
import {
  doubledBoostLog,
  passingLog,
  untouchedLog,
  type WrittenLog,
} from './documents/stop-without-a-loop-logs';
import {exercisesDemo} from './exercises';

const HOUR_MS = 3600 * 1000;
/** From start to hand-in: more than the run itself needs. */
const TAKES_MS = 6 * 60 * 1000;

interface Tried {
  readonly email: string;
  readonly log: () => WrittenLog;
  readonly hoursAgo: number;
}

/** Who tried what. The worker scores them like any other. */
const TRIED: readonly Tried[] = [
  {email: 'ines.holt@harrow-lane.example', log: untouchedLog, hoursAgo: 50},
  {email: 'ines.holt@harrow-lane.example', log: passingLog, hoursAgo: 49},
  {email: 'tom.asker@harrow-lane.example', log: doubledBoostLog, hoursAgo: 26},
];

export const attemptsDemo: DemoStep = {
  name: 'attempts',
  after: [exercisesDemo],
  async run(parts) {
    const people = new PeopleService(parts.db);
    const reader = new AttemptReadService(parts.db);
    for (const email of new Set(TRIED.map((each) => each.email))) {
      const trainee = await people.findByEmail(email);
      if (!trainee) continue; // made inactive since
      const {items} = await reader.listOwn(trainee, {limit: 1});
      if (items.length > 0) continue; // the demo ran before, or the trainee has begun
      for (const tried of TRIED) if (tried.email === email) await runAttempt(parts, trainee, tried);
    }
  },
};

async function runAttempt(
  {db, now}: DemoParts,
  trainee: Caller,
  {log, hoursAgo}: Tried,
): Promise<void> {
  const published = await new ExerciseService(db).listPublished(trainee);
  const found = published.find(({exercise}) => exercise.number === STOP_WITHOUT_A_LOOP.number);
  if (!found) throw new Error('the demo has no exercise to try');
  let time = new Date(now().getTime() - hoursAgo * HOUR_MS);
  const parts = {db, jobs: makeJobSender(), now: () => time};
  const [id, writerKey] = [newId(), newId()];
  const {entries, throughTick} = log();

  await new AttemptService(parts).start(trainee, id, {exerciseId: found.exerciseId, writerKey});
  time = new Date(time.getTime() + TAKES_MS);
  const logs = new AttemptLogService(parts, new AttemptReadService(db));
  await logs.addBatch(trainee, id, {
    writerKey,
    number: 1,
    throughTick,
    entries: entries as Entry[],
  });
}
