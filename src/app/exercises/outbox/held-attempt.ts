import {computed, signal} from '@angular/core';
import {type LogEntry} from '#sim-core/index';
import {type AttemptState, type Batch} from '#shared/attempts/attempt';
import {type ApiFailure} from '../../platform/api-failure';
import {type AttemptKeeper} from './attempt-keeper';
import {AttemptSender, type SenderState} from './attempt-sender';

/** What is told while an attempt is held. */
export interface HeldParts {
  readonly keeper: AttemptKeeper;
  readonly post: (batch: Batch) => Promise<{lastBatch: number; state: AttemptState}>;
  /** Something about it changed: what waits, or how the sending stands. */
  readonly changed: () => void;
}

/** An attempt that this tab keeps and sends, whatever page is open. */
export class HeldAttempt {
  /** How far the run is; the page that runs it says so. */
  tick: () => number = () => 0;

  readonly keeper: AttemptKeeper;
  private readonly stateNow = signal<SenderState>({kind: 'idle'});
  private readonly unsentNow = signal(0);
  private readonly handedInNow = signal(false);

  readonly sending = this.stateNow.asReadonly();
  /** Entries that only this device has. */
  readonly unsent = this.unsentNow.asReadonly();
  private readonly isLate = signal(false);
  /** Those of them that did not go at the first try; the others are on their way. */
  readonly late = computed(() => (this.isLate() ? this.unsentNow() : 0));
  /** Whether the server has the end. */
  readonly isHandedIn = this.handedInNow.asReadonly();

  private readonly sender: AttemptSender;

  constructor(private readonly parts: HeldParts) {
    this.keeper = parts.keeper;
    this.sender = new AttemptSender({
      keeper: parts.keeper,
      post: parts.post,
      tick: () => this.tick(),
      told: (state, unsent) => this.told(state, unsent),
      handedIn: () => this.handedInNow.set(true),
    });
  }

  /** Keeps an entry; resolves when it is safe. It is sent soon. */
  async add(entry: LogEntry): Promise<void> {
    await this.keeper.add(entry);
    this.unsentNow.update((count) => count + 1);
    this.parts.changed();
    this.sender.wake();
  }

  /** Looks at what is kept and sends what waits. */
  async sendWaiting(): Promise<void> {
    this.unsentNow.set(await this.keeper.countUnsent());
    this.stateNow.set({kind: 'idle'});
    this.parts.changed();
    this.sender.sendNow();
  }

  hurry(): void {
    if (this.unsentNow() > 0) this.sender.hurry();
  }

  stop(failure: ApiFailure): Promise<void> {
    return this.sender.stop(failure);
  }

  close(): Promise<void> {
    return this.sender.close();
  }

  private told(state: SenderState, unsent: number): void {
    this.stateNow.set(state);
    this.unsentNow.set(unsent);
    if (state.kind === 'waiting' || state.kind === 'stopped') this.isLate.set(true);
    if (unsent === 0) this.isLate.set(false);
    this.parts.changed();
  }
}
