import {Injectable, signal} from '@angular/core';

/** Whether the device is online, and what waits on it to be sent. */
@Injectable({providedIn: 'root'})
export class Connection {
  private readonly online = signal(navigator.onLine);
  private readonly waiting = signal(0);

  readonly isOnline = this.online.asReadonly();
  /** Entries that are on this device only. */
  readonly entriesWaiting = this.waiting.asReadonly();

  constructor() {
    addEventListener('online', () => this.online.set(true));
    addEventListener('offline', () => this.online.set(false));
  }

  setEntriesWaiting(count: number): void {
    this.waiting.set(count);
  }
}
