import {computed, inject, Injectable, signal} from '@angular/core';
import {may, type Permission} from '#shared/permissions';
import {
  type Me,
  type Preferences,
  readSession,
  SessionState,
  signIn,
  type SignInDraft,
  signOut,
  updatePreferences,
} from '#shared/session/session';
import {ApiCaller} from '../platform/api-caller';
import {type ApiFailure, toApiFailure} from '../platform/api-failure';
import {applyTheme} from '../platform/theme';

/** Who is signed in, on this page. */
@Injectable({providedIn: 'root'})
export class Session {
  private readonly api = inject(ApiCaller);
  private readonly state = signal<SessionState | null>(null);
  private readonly failed = signal<ApiFailure | null>(null);

  readonly me = computed<Me | null>(() => this.state()?.me ?? null);
  readonly units = computed<Preferences['units']>(() => this.me()?.preferences.units ?? 'si');
  readonly demoAccounts = computed(() => this.state()?.demoAccounts ?? []);
  /** Why nothing is known about the session: the server did not answer. */
  readonly failure = this.failed.asReadonly();

  may(permission: Permission): boolean {
    const me = this.me();
    return me !== null && may(me.role, permission);
  }

  /** Asks who is signed in; a server that does not answer is told on the sign-in page, not thrown. */
  async load(): Promise<void> {
    try {
      this.failed.set(null);
      this.take(await this.api.call(readSession, {}));
    } catch (error) {
      const failure = toApiFailure(error); // offline or unavailable
      this.failed.set(failure);
      // Without a connection the person who was signed in on this device goes on with what is kept here.
      if (failure.code === 'offline') this.state.set(readLast());
    }
  }

  async signIn(draft: SignInDraft): Promise<void> {
    this.take(await this.api.call(signIn, {body: draft}));
  }

  async signOut(): Promise<void> {
    this.take(await this.api.call(signOut, {}));
  }

  async updatePreferences(preferences: Preferences): Promise<void> {
    const me = await this.api.call(updatePreferences, {body: preferences});
    this.state.update((state) => (state === null ? null : {...state, me}));
    applyTheme(me.preferences.theme);
  }

  private take(state: SessionState): void {
    this.failed.set(null);
    this.state.set(state);
    keepLast(state);
    applyTheme(state.me?.preferences.theme ?? 'system');
  }
}

const LAST = 'evenspan.session';

/** Who was signed in last on this device: names only, the server decides at each call. */
function readLast(): SessionState | null {
  const kept = localStorage.getItem(LAST);
  const parsed = SessionState.safeParse(kept === null ? null : JSON.parse(kept));
  return parsed.success ? parsed.data : null;
}

function keepLast(state: SessionState): void {
  localStorage.setItem(LAST, JSON.stringify({...state, demoAccounts: []}));
}
