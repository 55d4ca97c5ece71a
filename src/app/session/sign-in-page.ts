import {ChangeDetectionStrategy, Component, inject, input, viewChild} from '@angular/core';
import {Router} from '@angular/router';
import {MatButtonModule} from '@angular/material/button';
import {Mark} from '../ui/mark';
import {Session} from './session';
import {SignInForm} from './sign-in-form';

/** The door. Where this installation is the demo, its accounts are one press away. */
@Component({
  selector: 'app-sign-in-page',
  templateUrl: './sign-in-page.html',
  styleUrl: './sign-in-page.scss',
  imports: [MatButtonModule, Mark, SignInForm],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SignInPage {
  protected readonly session = inject(Session);
  private readonly router = inject(Router);

  /** Page of this app to go to afterwards (query parameter). */
  readonly then = input<string>();

  private readonly form = viewChild.required(SignInForm);

  protected fill(email: string, password = ''): void {
    this.form().fill(email, password);
  }

  protected async goOn(): Promise<void> {
    const target = this.then();
    // Only a path of this app: "//host" would leave it.
    const isOurs = target?.startsWith('/') === true && !target.startsWith('//');
    await this.router.navigateByUrl(isOurs ? target : '/today');
  }
}
