import {
  downloadAttempts,
  listAttempts,
  listOwnAttempts,
  readAttempt,
  readAttemptLog,
  sendBatch,
  sendBeat,
  startAttempt,
  takeOverAttempt,
} from '#shared/attempts/attempt';
import {may} from '#shared/permissions';
import {type Feature} from '../../feature';
import {mount} from '../../http/mount';
import {AttemptBatchEntity} from './attempt-batch-entity';
import {AttemptEntity} from './attempt-entity';
import {AttemptLogService} from './log/attempt-log-service';
import {AttemptReadService} from './attempt-read-service';
import {AttemptResultEntity} from './attempt-result-entity';
import {AttemptService} from './attempt-service';

export const attemptsFeature: Feature = {
  entities: [AttemptBatchEntity, AttemptEntity, AttemptResultEntity],
  mount(router, parts) {
    const attempts = new AttemptService(parts);
    const reader = new AttemptReadService(parts.db);
    const log = new AttemptLogService(parts, reader);

    // `mine` must come before the pattern that would take it for an id.
    mount(router, listOwnAttempts, ({query}, caller) => reader.listOwn(caller, query));
    mount(router, listAttempts, ({query}, caller) => reader.list(caller, query));
    mount(router, downloadAttempts, async (input, caller) => ({
      fileName: 'attempts.csv',
      body: await reader.exportCsv(caller),
    }));
    mount(router, startAttempt, async ({params, body}, caller) => {
      await attempts.start(caller, params.attemptId, body);
      return reader.get(caller, params.attemptId);
    });
    mount(router, readAttempt, ({params}, caller) => reader.get(caller, params.attemptId));
    mount(router, takeOverAttempt, async ({params, body}, caller) => {
      await attempts.takeOver(caller, params.attemptId, body.writerKey);
      return reader.get(caller, params.attemptId);
    });
    mount(router, readAttemptLog, ({params}, caller) => log.getLog(caller, params.attemptId));
    mount(router, sendBatch, ({params, body}, caller) =>
      log.addBatch(caller, params.attemptId, body),
    );
    mount(router, sendBeat, async ({params, body}, caller) => ({
      nextBeatS: await log.beat(caller, params.attemptId, body),
    }));

    parts.events.allow('attempt', (caller, id) => reader.mayRead(caller, id));
    parts.events.allow('attempts', ({role}) => Promise.resolve(may(role, 'attempts:read-others')));
  },
};
