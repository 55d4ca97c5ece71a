import {ApiFailure} from '../../platform/api-failure';

/** Pause between beats until the server wishes otherwise [s]. */
const BEAT_S = 10;

/** What beats need of their surroundings. */
export interface BeatParts {
  /** Tells how far the run is; throws ApiFailure. */
  readonly post: (throughTick: number) => Promise<{nextBeatS: number}>;
  readonly tick: () => number;
  /** Whether time goes on: a run that stands has nothing to tell. */
  readonly isRunning: () => boolean;
  /** Another device writes this attempt now. */
  readonly writerChanged: (failure: ApiFailure) => void;
}

/** Tells the server now and then how far a run is, between the batches. */
export class Beat {
  private timer: ReturnType<typeof setTimeout> | undefined;
  private isClosed = false;

  constructor(private readonly parts: BeatParts) {}

  /** Beats at once, running or not: whoever opens an attempt learns whether another device has it. */
  async now(): Promise<void> {
    clearTimeout(this.timer);
    let nextS = BEAT_S;
    try {
      nextS = (await this.parts.post(this.parts.tick())).nextBeatS;
    } catch (error) {
      // ApiFailure: a beat that is lost costs nothing; batches tell what else is wrong
      if (!(error instanceof ApiFailure)) throw error;
      if (error.code === 'writer-changed') {
        this.parts.writerChanged(error);
        return;
      }
    }
    this.later(nextS);
  }

  close(): void {
    this.isClosed = true;
    clearTimeout(this.timer);
  }

  private later(seconds: number): void {
    if (this.isClosed) return;
    this.timer = setTimeout(() => {
      if (this.parts.isRunning()) void this.now();
      else this.later(seconds);
    }, seconds * 1000);
  }
}
