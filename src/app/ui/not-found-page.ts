import {ChangeDetectionStrategy, Component} from '@angular/core';
import {RouterLink} from '@angular/router';

/** An address that leads nowhere. */
@Component({
  selector: 'app-not-found-page',
  template: `
    <h1 tabindex="-1">This page does not exist</h1>
    <p>
      The address may be mistyped, or the thing is gone. <a routerLink="/today">Go to Today</a>.
    </p>
  `,
  imports: [RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class NotFoundPage {}
