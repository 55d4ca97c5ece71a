import {type ErrorHandler, Injectable, signal} from '@angular/core';

/** Bugs end here: logged for whoever looks, and told on the screen without losing it. */
@Injectable({providedIn: 'root'})
export class ErrorReporter implements ErrorHandler {
  private readonly last = signal<string | null>(null);

  readonly message = this.last.asReadonly();

  handleError(error: unknown): void {
    // eslint-disable-next-line no-console -- the one place where bugs are written down
    console.error(error);
    const isOldChunk = error instanceof Error && error.message.includes('dynamically imported');
    this.last.set(
      isOldChunk
        ? 'This part could not be fetched. Check the connection, then reload the page.'
        : 'Something went wrong on this page. What you ran is kept. Reload the page if it does not go on.',
    );
  }

  dismiss(): void {
    this.last.set(null);
  }
}
