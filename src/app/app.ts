import {
  ChangeDetectionStrategy,
  Component,
  computed,
  DestroyRef,
  effect,
  ElementRef,
  inject,
  Injector,
  untracked,
} from '@angular/core';
import {takeUntilDestroyed} from '@angular/core/rxjs-interop';
import {MatButtonModule} from '@angular/material/button';
import {MatDialog} from '@angular/material/dialog';
import {NavigationEnd, Router, RouterLink, RouterLinkActive, RouterOutlet} from '@angular/router';
import {SwUpdate} from '@angular/service-worker';
import {filter, firstValueFrom} from 'rxjs';
import {NAVIGATION} from './navigation';
import {BuildCheck} from './platform/build-check';
import {Connection} from './platform/connection';
import {ErrorReporter} from './platform/error-reporter';
import {SignInAgain} from './platform/sign-in-again';
import {Session} from './session/session';
import {Icon} from './ui/icon';
import {Mark} from './ui/mark';

/** The frame around every page: navigation, and what must be told whatever page is open. */
@Component({
  selector: 'app-root',
  templateUrl: './app.html',
  styleUrl: './app.scss',
  imports: [Icon, Mark, MatButtonModule, RouterLink, RouterLinkActive, RouterOutlet],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class App {
  protected readonly session = inject(Session);
  protected readonly connection = inject(Connection);
  protected readonly build = inject(BuildCheck);
  protected readonly errors = inject(ErrorReporter);
  private readonly element = inject<ElementRef<HTMLElement>>(ElementRef);
  private readonly dialog = inject(MatDialog);
  private readonly updates = inject(SwUpdate);
  private readonly injector = inject(Injector);

  protected readonly entries = computed(() =>
    NAVIGATION.filter((entry) => this.session.may(entry.permission)),
  );
  protected readonly waitingText = computed(() => {
    const count = this.connection.entriesWaiting();
    return count === 0
      ? ''
      : `${count} ${count === 1 ? 'entry' : 'entries'} not sent yet, kept on this device.`;
  });

  constructor() {
    let hasRun = false;
    effect(() => {
      const mayRun = this.session.may('attempts:run');
      if (mayRun || hasRun) untracked(() => void this.sendWaiting());
      hasRun ||= mayRun; // whoever signs out must not go on sending
    });
    inject(SignInAgain).askBy(() => this.askToSignInAgain());
    inject(Router)
      .events.pipe(
        filter((event) => event instanceof NavigationEnd),
        takeUntilDestroyed(inject(DestroyRef)),
      )
      .subscribe(() => requestAnimationFrame(() => this.focusHeading()));
  }

  protected skipToPage(event: Event): void {
    event.preventDefault(); // a fragment in the address would change the route
    this.element.nativeElement.querySelector<HTMLElement>('#page')?.focus();
  }

  /** The newer build must be the one that answers before the page asks for it. */
  protected async reload(): Promise<void> {
    if (this.updates.isEnabled) {
      await this.updates.checkForUpdate().catch(() => false); // no connection: reload what there is
    }
    location.reload();
  }

  /** A screen reader hears where it is; the first page keeps the browser's own focus. */
  private focusHeading(): void {
    const heading = this.element.nativeElement.querySelector<HTMLElement>('h1[tabindex="-1"]');
    if (document.activeElement === document.body || document.activeElement?.closest('nav')) {
      heading?.focus({preventScroll: true});
    }
  }

  /** What an earlier visit could not send goes now, whatever page is open. */
  private async sendWaiting(): Promise<void> {
    const {Outbox} = await import('./exercises/outbox/outbox');
    await this.injector.get(Outbox).sendWaiting();
  }

  private async askToSignInAgain(): Promise<boolean> {
    const {SignInDialog} = await import('./session/sign-in-dialog');
    const opened = this.dialog.open<unknown, unknown, boolean>(SignInDialog, {disableClose: true});
    return (await firstValueFrom(opened.afterClosed())) === true;
  }
}
