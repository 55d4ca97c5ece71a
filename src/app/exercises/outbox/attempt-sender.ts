import {type AttemptState, type Batch} from '#shared/attempts/attempt';
import {ApiFailure} from '../../platform/api-failure';
import {type AttemptKeeper} from './attempt-keeper';

/** Entries gather this long before they go; the contract allows two seconds. */
const GATHER_MS = 700;
const FIRST_WAIT_MS = 1000;
const LONGEST_WAIT_MS = 30_000;

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
  private isSending = false;
  private isClosed = false;
  private state: SenderState = {kind: 'idle'};

  constructor(private readonly parts: SenderParts) {}

  /** Something waits: send it soon. */
  wake(): void {
    if (this.state.kind !== 'stopped' && !this.isSending && this.timer === undefined) {
      this.sendIn(GATHER_MS);
    }
  }

  /** The connection is back, or a person asked: send at once. */
  sendNow(): void {
    if (this.isSending) return;
    this.waitMs = FIRST_WAIT_MS;
    this.state = {kind: 'idle'};
    this.sendIn(0);
  }

  close(): void {
    this.isClosed = true;
    clearTimeout(this.timer);
  }

  private sendIn(ms: number): void {
    clearTimeout(this.timer);
    if (this.isClosed) return;
    this.timer = setTimeout(() => {
      this.timer = undefined;
      void this.sendAll();
    }, ms);
  }

  private async sendAll(): Promise<void> {
    this.isSending = true;
    try {
      for (;;) {
        const batch = await this.parts.keeper.nextBatch(this.parts.tick());
        if (batch === null || this.isClosed) break;
        await this.tell({kind: 'sending'});
        const {lastBatch, state} = await this.parts.post(batch);
        await this.parts.keeper.acknowledge(lastBatch);
        this.waitMs = FIRST_WAIT_MS;
        if (state !== 'running') {
          this.parts.handedIn();
          break;
        }
      }
      await this.tell({kind: 'idle'});
    } catch (error) {
      // ApiFailure: no connection, or a refusal; anything else is a bug.
      if (!(error instanceof ApiFailure)) throw error;
      await this.recover(error);
    } finally {
      this.isSending = false;
    }
  }

  private async recover(failure: ApiFailure): Promise<void> {
    switch (failure.code) {
      case 'batch-missing':
        await this.parts.keeper.rewindTo(failure.problem?.wanted ?? 1);
        this.sendIn(0);
        return;
      case 'batch-differs':
      case 'entry-refused':
      case 'attempt-over':
      case 'writer-changed':
      case 'invalid-input':
      case 'not-allowed':
      case 'not-found':
        await this.tell({kind: 'stopped', failure});
        return;
      default:
        // offline, too-fast, too-many-requests, unavailable, internal, a closed sign-in: it will go later
        await this.tell({kind: 'waiting'});
        this.sendIn(this.waitMs * (0.75 + 0.5 * (this.parts.random ?? Math.random)()));
        this.waitMs = Math.min(2 * this.waitMs, LONGEST_WAIT_MS);
    }
  }

  private async tell(state: SenderState): Promise<void> {
    this.state = state;
    const unsent = await this.parts.keeper.countUnsent();
    if (!this.isClosed) this.parts.told(state, unsent);
  }
}
