import {ChangeDetectionStrategy, Component, inject} from '@angular/core';
import {MatButtonModule} from '@angular/material/button';
import {MatDialogModule, MatDialogRef} from '@angular/material/dialog';
import {Session} from './session';
import {SignInForm} from './sign-in-form';

/** Sign-in over the screen: nothing below it is dropped. */
@Component({
  selector: 'app-sign-in-dialog',
  template: `
    <h2 mat-dialog-title>Please sign in again</h2>
    <mat-dialog-content>
      <p>You were signed out. Everything on this screen is kept.</p>
      <app-sign-in-form [fixedEmail]="email" (signedIn)="dialog.close(true)" />
    </mat-dialog-content>
    <mat-dialog-actions align="end">
      <button matButton type="button" [mat-dialog-close]="false">Not now</button>
    </mat-dialog-actions>
  `,
  imports: [MatButtonModule, MatDialogModule, SignInForm],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SignInDialog {
  protected readonly dialog = inject<MatDialogRef<SignInDialog, boolean>>(MatDialogRef);
  // The same person signs in again: somebody else's run must not end up under another name.
  protected readonly email = inject(Session).me()?.email ?? null;
}
