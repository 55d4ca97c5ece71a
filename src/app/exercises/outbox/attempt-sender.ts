import {type AttemptState, type Batch} from '#shared/attempts/attempt';
import {ApiFailure, type FailureCode} from '../../platform/api-failure';
import {type AttemptKeeper} from './attempt-keeper';

/** Entries gather this long before they go; the contract allows two seconds. */
const GATHER_MS = 700;
const FIRST_WAIT_MS = 1000;
const LONGEST_WAIT_MS = 30_000;

/** What no repetition mends: somebody has to read it and decide. */
const STOPPING: readonly FailureCode[] = [
  'attempt-over',
  'batch-differs',
  'body-too-large',
  'entry-refused',
  'invalid-input',
  'not-allowed',
  'not-found',
  'not-signed-in',
  'writer-changed',
];

/** How the log's way to the server stands. `stopped` needs a person. */
export type SenderState =
  | {readonly kind: 'idle' | 'sending' | 'waiting'}
  | {readonly kind: 'stopped'; readonly failure: ApiFailure};

/** What the sender needs of its surroundings. */
export interface SenderParts {
  readonly keeper: AttemptKeeper;
  /** Sends one batch; throws ApiFailure. */
  readonly post: (batch: Batch) => Promise<{lastBatch: number; state: AttemptState}>;
  /** How far the run is now. */
  readonly tick: () => number;
  readonly told: (state: SenderState, unsent: number) => void;
  /** The server has the `end`: nothing is left to send. */
  readonly handedIn: () => void;
  readonly random?: () => number;
}

/** Sends an attempt's log: one request at a time, in order, until the server has it all. */
export class AttemptSender {
  private timer: ReturnType<typeof setTimeout> | undefined;
  private waitMs = FIRST_WAIT_MS;
  private sending: Promise<void> | null = null;
  private isClosed = false;
  private state: SenderState = {kind: 'idle'};

  constructor(private readonly parts: SenderParts) {}

  /** Something waits: send it soon. */
  wake(): void {
    const isOnItsWay = this.sending !== null || this.timer !== undefined;
    if (this.state.kind !== 'stopped' && !isOnItsWay) this.sendIn(GATHER_MS);
  }

  /** The connection is back: no need to wait longer. */
  hurry(): void {
    if (this.state.kind !== 'stopped') this.sendNow();
  }

  /** A person asked, and may have mended what stopped it. */
  sendNow(): void {
    this.waitMs = FIRST_WAIT_MS;
    if (this.sending !== null) return;
    this.state = {kind: 'idle'};
    this.sendIn(0);
  }

  /** Stops for a reason that was seen elsewhere. */
  stop(failure: ApiFailure): Promise<void> {
    clearTimeout(this.timer);
    this.timer = undefined;
    return this.tell({kind: 'stopped', failure});
  }

  /** Sends nothing more; resolves when the last request is over. */
  async close(): Promise<void> {
    this.isClosed = true;
    clearTimeout(this.timer);
    await this.sending;
  }

  private sendIn(ms: number): void {
    clearTimeout(this.timer);
    if (this.isClosed) return;
    this.timer = setTimeout(() => {
      this.timer = undefined;
      this.sending = this.sendAll().finally(() => (this.sending = null));
    }, ms);
  }

  private async sendAll(): Promise<void> {
    for (;;) {
      const batch = await this.parts.keeper.nextBatch(this.parts.tick());
      if (batch === null || this.isClosed) break;
      await this.tell({kind: 'sending'});
      try {
        if (await this.send(batch)) break;
      } catch (error) {
        // ApiFailure: no connection, or a refusal; anything else is a bug.
        if (!(error instanceof ApiFailure)) throw error;
        return this.recover(error, batch);
      }
    }
    await this.tell({kind: 'idle'});
  }

  /** Whether that was the last one. */
  private async send(batch: Batch): Promise<boolean> {
    const {lastBatch, state} = await this.parts.post(batch);
    await this.parts.keeper.acknowledge(lastBatch);
    this.waitMs = FIRST_WAIT_MS;
    if (state === 'running') return false;
    this.parts.handedIn();
    return true;
  }

  private async recover(failure: ApiFailure, batch: Batch): Promise<void> {
    const wanted = failure.problem?.wanted ?? 1;
    if (failure.code === 'batch-missing' && wanted < batch.number) {
      await this.parts.keeper.rewindTo(wanted);
      this.sendIn(0);
    } else if (STOPPING.includes(failure.code) || failure.code === 'batch-missing') {
      await this.tell({kind: 'stopped', failure});
    } else {
      await this.tell({kind: 'waiting'}); // offline, too-fast, too-many-requests, unavailable, internal
      this.sendIn(this.pauseMs(failure));
      this.waitMs = Math.min(2 * this.waitMs, LONGEST_WAIT_MS);
    }
  }

  /** Longer each time, never at one moment with all the others. */
  private pauseMs({problem}: ApiFailure): number {
    const jitter = 0.75 + 0.5 * (this.parts.random ?? Math.random)();
    const mostMs = Math.min(this.waitMs * jitter, LONGEST_WAIT_MS);
    return Math.max(mostMs, 1000 * (problem?.retryAfterS ?? 0));
  }

  private async tell(state: SenderState): Promise<void> {
    this.state = state;
    const unsent = await this.parts.keeper.countUnsent();
    if (!this.isClosed) this.parts.told(state, unsent);
  }
}
