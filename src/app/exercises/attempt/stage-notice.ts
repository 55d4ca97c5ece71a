import {ChangeDetectionStrategy, Component, input, output} from '@angular/core';
import {MatButtonModule} from '@angular/material/button';
import {RouterLink} from '@angular/router';
import {PageState} from '../../ui/page-state';
import {type Stage} from './attempt-store';

/** What stands in place of the run while it can't go on: why, and what to do. */
@Component({
  selector: 'app-stage-notice',
  templateUrl: './stage-notice.html',
  styleUrl: './notice.scss',
  imports: [MatButtonModule, PageState, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class StageNotice {
  readonly stage = input.required<Stage>();
  readonly exerciseId = input.required<string>();
  /** What of this attempt is not sent yet. */
  readonly sendingText = input('');

  readonly opened = output();
  readonly takenOver = output();
  readonly serverChosen = output();
  readonly sentAgain = output();
}
