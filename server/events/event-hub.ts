import {type Caller} from '../caller';
import {AppError} from '../errors';
import {type EventStream} from '../http/event-stream';
import {type Notice} from './notify';

/** Whether the caller may follow a topic; `id` is what stands behind the colon. */
export type TopicRule = (caller: Caller, id: string) => Promise<boolean>;

/** A stream ends after this [ms]; the reader comes back, and what it may follow is looked at anew. */
const LASTS_MS = 15 * 60 * 1000;

interface Follower {
  readonly organisationId: string;
  readonly topics: ReadonlySet<string>;
  readonly stream: EventStream;
}

/** Open streams of this process, and who is told what. */
export class EventHub {
  private readonly rules = new Map<string, TopicRule>();
  private readonly followers = new Set<Follower>();

  /** Registers who may follow `prefix` or `prefix:<id>`; a topic without a rule is refused. */
  allow(prefix: string, rule: TopicRule): void {
    this.rules.set(prefix, rule);
  }

  /** Opens the stream when the caller may follow every topic asked for. */
  async follow(caller: Caller, topics: readonly string[], stream: EventStream): Promise<void> {
    for (const topic of topics) await this.check(caller, topic);
    const follower = {organisationId: caller.organisationId, topics: new Set(topics), stream};
    this.followers.add(follower);
    const end = setTimeout(() => stream.end(), LASTS_MS);
    stream.onClose(() => {
      clearTimeout(end);
      this.followers.delete(follower);
    });
    stream.open();
  }

  /** Passes a notice on to those who follow it in its own organisation. */
  pass({organisationId, topic, kind, id}: Notice): void {
    for (const follower of this.followers) {
      if (follower.organisationId !== organisationId || !follower.topics.has(topic)) continue;
      follower.stream.send({topic, kind, id});
    }
  }

  beat(): void {
    for (const {stream} of this.followers) stream.beat();
  }

  /** Ends every stream: at shutdown, since no server closes while one is open. */
  endAll(): void {
    for (const {stream} of [...this.followers]) stream.end();
  }

  private async check(caller: Caller, topic: string): Promise<void> {
    const [prefix = '', id = ''] = topic.split(':');
    const rule = this.rules.get(prefix);
    if (rule && (await rule(caller, id))) return;
    throw new AppError('not-found', {detail: `There is nothing to follow at ${topic}.`});
  }
}
