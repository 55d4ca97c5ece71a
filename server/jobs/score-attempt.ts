import * as z from 'zod';
import {ScoringService} from '../features/attempts/scoring-service';
import {job} from './job';
import {ReplayPool} from './replay-pool';

const pool = new ReplayPool();

/** Runs a handed-in log again and stores what it is worth. Keyed by attempt and engine number. */
export const scoreAttempt = job({
  name: 'score-attempt',
  data: z.object({organisationId: z.uuid(), attemptId: z.uuid()}),
  expireInSeconds: 60,
  retryLimit: 2,
  run: (attempt, parts) => new ScoringService(parts).score(attempt, (work) => pool.run(work)),
  givenUp: (attempt, parts) => new ScoringService(parts).giveUp(attempt),
  close: () => pool.close(),
});
