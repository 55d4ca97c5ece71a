import {type Request, type Response} from 'express';
import {type Nudge} from '#shared/events/events';

/** One open stream of server-sent events. */
export class EventStream {
  private readonly closers: (() => void)[] = [];
  private isOpen = true;

  constructor(
    req: Request,
    private readonly res: Response,
  ) {
    req.once('close', () => this.close());
    res.once('close', () => this.close());
  }

  /** Answers the request: from here on nothing can be refused any more. */
  open(): void {
    this.res.writeHead(200, {
      'Content-Type': 'text/event-stream',
      'Cache-Control': 'no-cache, no-transform',
      'X-Accel-Buffering': 'no', // a proxy must pass every line on at once
    });
    this.beat();
  }

  send(nudge: Nudge): void {
    if (this.isOpen) this.res.write(`data: ${JSON.stringify(nudge)}\n\n`);
  }

  /** A comment line, so that nobody between takes the connection for dead. */
  beat(): void {
    if (this.isOpen) this.res.write(': \n\n');
  }

  onClose(run: () => void): void {
    if (this.isOpen) this.closers.push(run);
    else run();
  }

  /** Ends the stream from our side. */
  end(): void {
    this.res.end();
    this.close();
  }

  private close(): void {
    if (!this.isOpen) return;
    this.isOpen = false;
    for (const run of this.closers) run();
  }
}
