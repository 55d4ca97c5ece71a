import {Client} from 'pg';
import {type Logger} from 'pino';
import * as z from 'zod';
import {type EventHub} from './event-hub';
import {CHANNEL} from './notify';

const BEAT_MS = 15_000;
/** Wait before listening again: doubled from the first to the longest [ms]. */
const FIRST_WAIT_MS = 250;
const LONGEST_WAIT_MS = 10_000;

const Notice = z.object({
  organisationId: z.string(),
  topic: z.string(),
  kind: z.string(),
  id: z.string(),
});

/** The one connection of this process that hears what all instances tell; outside the pool, since it is never given back. */
export class Listener {
  private client: Client | undefined;
  private timer: NodeJS.Timeout | undefined;
  private beats: NodeJS.Timeout | undefined;
  private waitMs = FIRST_WAIT_MS;
  private isStopped = false;

  constructor(
    private readonly url: string,
    private readonly hub: EventHub,
    private readonly log: Logger,
  ) {}

  async start(): Promise<void> {
    this.beats = setInterval(() => this.beat(), BEAT_MS);
    await this.listen();
  }

  async stop(): Promise<void> {
    this.isStopped = true;
    clearInterval(this.beats);
    clearTimeout(this.timer);
    const {client} = this;
    this.client = undefined;
    await client?.end();
  }

  private async listen(): Promise<void> {
    const client = new Client({
      connectionString: this.url,
      application_name: 'evenspan-events',
      keepAlive: true,
      query_timeout: BEAT_MS,
    });
    client.on('error', () => this.lose(client));
    client.on('end', () => this.lose(client));
    client.on('notification', ({payload}) => this.pass(payload ?? ''));
    this.client = client;
    try {
      await client.connect();
      await client.query(`listen ${CHANNEL}`);
      this.waitMs = FIRST_WAIT_MS;
    } catch (error) {
      this.log.warn({err: error}, 'cannot listen for events'); // the database is gone or restarts
      this.lose(client);
    }
  }

  /** What was told meanwhile is lost, so every stream ends: the readers come back and read again. */
  private lose(client: Client): void {
    if (this.client !== client || this.isStopped) return;
    this.client = undefined;
    client.end().catch(() => undefined); // it may never have been open
    this.hub.endAll();
    this.timer = setTimeout(() => void this.listen(), this.waitMs);
    this.waitMs = Math.min(this.waitMs * 2, LONGEST_WAIT_MS);
  }

  private pass(payload: string): void {
    const notice = Notice.safeParse(safeJson(payload));
    if (notice.success) this.hub.pass(notice.data);
    else this.log.error({payload}, 'a notice that nobody can read');
  }

  /** Keeps the streams open, and notices a connection that died without a word. */
  private beat(): void {
    this.hub.beat();
    const {client} = this;
    client?.query('select 1').catch(() => this.lose(client));
  }
}

function safeJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return undefined; // SyntaxError: somebody else's notice on our channel
  }
}
