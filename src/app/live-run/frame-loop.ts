/** What a frame loop drives: runs ticks, and says how many seconds one tick is. */
export interface Driven {
  readonly sampleS: number;
  /** Runs ticks; resolves when they are run and shown. */
  advance(ticks: number): Promise<void>;
}

/** The browser's frames and clock; tests give their own. */
export interface FrameSource {
  now(): number;
  request(callback: () => void): number;
  cancel(handle: number): void;
}

export const BROWSER_FRAMES: FrameSource = {
  now: () => performance.now(),
  request: (callback) => requestAnimationFrame(callback),
  cancel: (handle) => cancelAnimationFrame(handle),
};

/** Time that is let go rather than made up for, at factor 1 [ms]: a stutter must not become a jump. */
const MOST_BEHIND_MS = 250;

/**
 * The page owns time: each frame asks for the ticks that are due, one request in flight. Falls at most
 * 250 ms × factor behind; what is more is let go.
 */
export class FrameLoop {
  private handle: number | null = null;
  private lastMs = 0;
  private dueS = 0;
  private isAsking = false;
  private speed = 1;

  constructor(
    private readonly driven: Driven,
    private readonly drawFrame: () => void,
    private readonly frames: FrameSource = BROWSER_FRAMES,
  ) {}

  get isRunning(): boolean {
    return this.handle !== null;
  }

  set factor(factor: number) {
    this.speed = factor;
  }

  start(): void {
    if (this.handle !== null) return;
    this.lastMs = this.frames.now();
    this.dueS = 0;
    this.handle = this.frames.request(this.frame);
  }

  stop(): void {
    if (this.handle !== null) this.frames.cancel(this.handle);
    this.handle = null;
  }

  private readonly frame = (): void => {
    const nowMs = this.frames.now();
    const mostS = (MOST_BEHIND_MS / 1000) * this.speed;
    this.dueS = Math.min(this.dueS + ((nowMs - this.lastMs) / 1000) * this.speed, mostS);
    this.lastMs = nowMs;
    this.askForTicks();
    this.drawFrame();
    this.handle = this.frames.request(this.frame);
  };

  private askForTicks(): void {
    const ticks = Math.floor(this.dueS / this.driven.sampleS);
    if (this.isAsking || ticks === 0) return;
    this.dueS -= ticks * this.driven.sampleS;
    this.isAsking = true;
    void this.driven.advance(ticks).finally(() => (this.isAsking = false));
  }
}
