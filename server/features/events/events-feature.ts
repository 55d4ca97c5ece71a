import {followEvents, Topic} from '#shared/events/events';
import {AppError} from '../../errors';
import {type Feature} from '../../feature';
import {mount} from '../../http/mount';

/** Topics one stream may follow. */
const MOST_TOPICS = 20;

export const eventsFeature: Feature = {
  mount(router, {events}) {
    mount(router, followEvents, ({query}, caller, stream) =>
      events.follow(caller, readTopics(query.topics), stream),
    );
  },
};

function readTopics(text: string): string[] {
  const topics = [...new Set(text.split(','))];
  const wrong = topics.find((topic) => !Topic.safeParse(topic).success);
  if (wrong === undefined && topics.length <= MOST_TOPICS) return topics;
  const message =
    wrong === undefined ? `At most ${MOST_TOPICS} topics.` : 'There is no such topic.';
  throw new AppError('invalid-input', {
    errors: [{path: 'query.topics', message, value: wrong ?? topics.length}],
  });
}
