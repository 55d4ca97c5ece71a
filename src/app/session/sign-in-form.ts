import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  output,
  signal,
} from '@angular/core';
import {FormsModule} from '@angular/forms';
import {MatButtonModule} from '@angular/material/button';
import {MatFormFieldModule} from '@angular/material/form-field';
import {MatInputModule} from '@angular/material/input';
import {type ApiFailure, toApiFailure} from '../platform/api-failure';
import {Session} from './session';

/** E-mail and password; what was typed stays when it is refused. */
@Component({
  selector: 'app-sign-in-form',
  templateUrl: './sign-in-form.html',
  styleUrl: './sign-in-form.scss',
  imports: [FormsModule, MatButtonModule, MatFormFieldModule, MatInputModule],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SignInForm {
  private readonly session = inject(Session);

  /** Fixes the e-mail, when the same person has to sign in again. */
  readonly fixedEmail = input<string | null>(null);
  readonly signedIn = output();

  protected readonly email = signal('');
  protected readonly password = signal('');
  protected readonly isBusy = signal(false);
  private readonly failure = signal<ApiFailure | null>(null);

  protected readonly message = computed(() => {
    const failure = this.failure();
    return failure === null ? null : sentenceOf(failure);
  });

  /** Fills the form, for the demo's accounts. */
  fill(email: string, password: string): void {
    this.email.set(email);
    this.password.set(password);
  }

  protected async send(): Promise<void> {
    if (this.isBusy()) return;
    this.isBusy.set(true);
    this.failure.set(null);
    try {
      await this.session.signIn({
        email: this.fixedEmail() ?? this.email(),
        password: this.password(),
      });
      this.signedIn.emit();
    } catch (error) {
      this.failure.set(toApiFailure(error)); // wrong pair, too many tries, offline
    } finally {
      this.isBusy.set(false);
    }
  }
}

function sentenceOf(failure: ApiFailure): string {
  switch (failure.code) {
    case 'not-signed-in':
    case 'invalid-input':
      return 'This e-mail and password do not belong together. Check both and try again.';
    case 'too-many-requests':
      return `Too many tries. Wait ${waitOf(failure.problem?.retryAfterS ?? 60)}, then try again.`;
    case 'offline':
      return 'The server did not answer. Check the connection and try again.';
    default:
      return `Sign-in did not work: ${failure.message}`;
  }
}

function waitOf(seconds: number): string {
  return seconds < 90 ? `${Math.ceil(seconds)} seconds` : `${Math.ceil(seconds / 60)} minutes`;
}
