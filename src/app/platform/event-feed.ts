import {Injectable} from '@angular/core';
import {Observable} from 'rxjs';
import {followEvents, Nudge} from '#shared/events/events';
import {urlOf} from './api-caller';

const FIRST_WAIT_MS = 1000;
const LONGEST_WAIT_MS = 30_000;

/** Nudges from the server. A missed one costs nothing: after a reconnect everybody reads again. */
@Injectable({providedIn: 'root'})
export class EventFeed {
  /** Follows topics while subscribed; emits null after each (re)connect, meaning "read again". */
  follow(topics: readonly string[]): Observable<Nudge | null> {
    return new Observable((subscriber) => {
      const url = `${urlOf(followEvents.path)}?topics=${encodeURIComponent(topics.join(','))}&ngsw-bypass`;
      let waitMs = FIRST_WAIT_MS;
      let timer: ReturnType<typeof setTimeout> | undefined;
      let source: EventSource | undefined;

      const connect = (): void => {
        source = new EventSource(url, {withCredentials: true});
        source.onopen = () => {
          waitMs = FIRST_WAIT_MS;
          subscriber.next(null);
        };
        source.onmessage = (message: MessageEvent<string>) => {
          const nudge = Nudge.safeParse(JSON.parse(message.data));
          if (nudge.success) subscriber.next(nudge.data);
        };
        source.onerror = () => {
          source?.close();
          timer = setTimeout(connect, waitMs * (0.5 + Math.random()));
          waitMs = Math.min(2 * waitMs, LONGEST_WAIT_MS);
        };
      };

      connect();
      return () => {
        clearTimeout(timer);
        source?.close();
      };
    });
  }
}
