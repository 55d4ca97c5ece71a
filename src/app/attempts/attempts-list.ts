import {inject, Injectable, signal} from '@angular/core';
import {type AttemptSummary, listAttempts} from '#shared/attempts/attempt';
import {ApiCaller} from '../platform/api-caller';
import {type ApiFailure, toApiFailure} from '../platform/api-failure';

const PAGE = 50;

/** Everybody's attempts as far as they were read, newest first. */
@Injectable()
export class AttemptsList {
  private readonly api = inject(ApiCaller);

  private readonly read = signal<readonly AttemptSummary[] | null>(null);
  private readonly cursor = signal<string | null>(null);
  private readonly failed = signal<ApiFailure | null>(null);

  /** Null until the first answer. */
  readonly attempts = this.read.asReadonly();
  readonly failure = this.failed.asReadonly();
  readonly nextCursor = this.cursor.asReadonly();

  private q = '';
  private asked = 0;

  /** Reads the first page of what fits `q`. */
  async find(q: string): Promise<void> {
    this.q = q;
    await this.fetch(null, (items, next) => {
      this.read.set(items);
      this.cursor.set(next);
    });
  }

  /** Reads what is new; what was read further down stays. */
  async refresh(): Promise<void> {
    await this.fetch(null, (items, next) => {
      const isOneOf = new Set(items.map(({id}) => id));
      const rest = (this.read() ?? []).filter(({id}) => !isOneOf.has(id));
      const oldest = items.at(-1)?.startedAt ?? '';
      const further = next === null ? [] : rest.filter(({startedAt}) => startedAt <= oldest);
      if (further.length === 0) this.cursor.set(next);
      this.read.set([...items, ...further]);
    });
  }

  async readOn(): Promise<void> {
    await this.fetch(this.cursor(), (items, next) => {
      this.read.update((old) => [...(old ?? []), ...items]);
      this.cursor.set(next);
    });
  }

  private async fetch(
    cursor: string | null,
    take: (items: readonly AttemptSummary[], next: string | null) => void,
  ): Promise<void> {
    const mine = ++this.asked;
    const q = this.q.trim();
    const query = {limit: PAGE, ...(cursor && {cursor}), ...(q && {q})};
    try {
      const page = await this.api.call(listAttempts, {query});
      if (mine !== this.asked) return; // somebody typed on meanwhile
      this.failed.set(null);
      take(page.items, page.nextCursor);
    } catch (error) {
      if (mine === this.asked) this.failed.set(toApiFailure(error)); // what was shown stays
    }
  }
}
