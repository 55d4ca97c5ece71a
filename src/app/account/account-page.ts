import {ChangeDetectionStrategy, Component, inject, signal} from '@angular/core';
import {MatButtonModule} from '@angular/material/button';
import {MatButtonToggleModule} from '@angular/material/button-toggle';
import {Router} from '@angular/router';
import {type Preferences} from '#shared/session/session';
import {type ApiFailure, toApiFailure} from '../platform/api-failure';
import {Session} from '../session/session';

/** The person's own choices: units and theme, and the way out. */
@Component({
  selector: 'app-account-page',
  templateUrl: './account-page.html',
  styleUrl: './account-page.scss',
  imports: [MatButtonModule, MatButtonToggleModule],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AccountPage {
  protected readonly session = inject(Session);
  private readonly router = inject(Router);

  protected readonly failure = signal<ApiFailure | null>(null);
  protected readonly isSaved = signal(false);

  protected async choose(change: Partial<Preferences>): Promise<void> {
    const me = this.session.me();
    if (me === null) return;
    this.failure.set(null);
    this.isSaved.set(false);
    try {
      await this.session.updatePreferences({...me.preferences, ...change});
      this.isSaved.set(true);
    } catch (error) {
      this.failure.set(toApiFailure(error)); // offline or refused: the old choice stays
    }
  }

  protected async leave(): Promise<void> {
    try {
      await this.session.signOut();
      await this.router.navigateByUrl('/sign-in');
    } catch (error) {
      this.failure.set(toApiFailure(error)); // offline: still signed in, and told so
    }
  }
}
