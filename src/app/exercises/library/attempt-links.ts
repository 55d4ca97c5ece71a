import {DatePipe, DecimalPipe} from '@angular/common';
import {ChangeDetectionStrategy, Component, input} from '@angular/core';
import {RouterLink} from '@angular/router';
import {type AttemptSummary} from '#shared/attempts/attempt';

/** A person's own attempts at one exercise, each with what came of it. */
@Component({
  selector: 'app-attempt-links',
  template: `
    <ul>
      @for (attempt of attempts(); track attempt.id) {
        <li>
          <a [routerLink]="['/exercises', attempt.exercise.id, 'attempts', attempt.id, 'result']">{{
            attempt.startedAt | date: 'd MMM yyyy, HH:mm'
          }}</a>
          <span>
            @if (attempt.score !== null) {
              <b class="number">{{ attempt.score | number: '1.0-1' }}</b>
              {{ attempt.passed ? 'passed' : 'not yet' }}
            } @else {
              <span class="muted">{{ words[attempt.state] }}</span>
            }
          </span>
        </li>
      }
    </ul>
  `,
  styles: `
    ul {
      max-width: 30rem;
      margin: 0.5rem 0;
      padding: 0;
      list-style: none;
    }
    li {
      display: flex;
      gap: 1rem;
      justify-content: space-between;
      padding: 0.5rem 0;
      border-top: 1px solid var(--rule);
    }
  `,
  imports: [DatePipe, DecimalPipe, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AttemptLinks {
  readonly attempts = input.required<readonly AttemptSummary[]>();

  protected readonly words = {
    running: 'not handed in',
    'handed-in': 'being scored',
    failed: 'could not be scored',
    scored: '',
  };
}
