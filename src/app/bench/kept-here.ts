import {inject, Injectable} from '@angular/core';
import {type LogEntry, type Scenario} from '#sim-core/index';
import {Session} from '../session/session';
import {type RollSize} from './set-ups/stand';

/** A run of the free Bench as this device keeps it. */
export interface KeptRun {
  readonly document: Scenario;
  readonly entries: readonly LogEntry[];
  readonly throughTick: number;
  readonly rollSize: RollSize;
  /** Key of the set-up it began from; the first one for runs kept before there were several. */
  readonly setUp?: string;
}

/** Keeps the run of the free Bench on this device, one a person: a reload goes on where it was. */
@Injectable({providedIn: 'root'})
export class KeptHere {
  private readonly session = inject(Session);

  read(): KeptRun | null {
    try {
      const text = localStorage.getItem(this.key());
      return text === null ? null : (JSON.parse(text) as KeptRun);
    } catch {
      return null; // storage refused by the browser, or text that is no JSON: begin anew
    }
  }

  write(kept: KeptRun): void {
    try {
      localStorage.setItem(this.key(), JSON.stringify(kept));
    } catch {
      // storage full or refused: the run goes on, only a reload would lose it
    }
  }

  private key(): string {
    return `evenspan.bench.${this.session.me()?.id ?? 'nobody'}`;
  }
}
