import {Injectable} from '@angular/core';

/** Asks for sign-in over whatever is on the screen. The session room gives the way to ask. */
@Injectable({providedIn: 'root'})
export class SignInAgain {
  private asking: Promise<boolean> | null = null;
  private way: () => Promise<boolean> = () => Promise.resolve(false);

  /** Says how to ask; the answer is whether somebody signed in. */
  askBy(way: () => Promise<boolean>): void {
    this.way = way;
  }

  /** Many calls may fail at once; they share one question. */
  ask(): Promise<boolean> {
    this.asking ??= this.way().finally(() => (this.asking = null));
    return this.asking;
  }
}
