import {ChangeDetectionStrategy, Component, input} from '@angular/core';
import {DecimalPipe} from '@angular/common';
import {type ResultLine} from './result-lines';

/** One criterion of a result: what was asked, what was reached, the marks and why. */
@Component({
  selector: 'app-score-line',
  template: `
    @let shown = line();
    <span class="number muted">{{ shown.number }}</span>
    <div class="words">
      <p>{{ shown.sentence }}</p>
      <p class="muted">{{ shown.reason }}</p>
    </div>
    <span class="number value" [class.lost]="shown.isLost">{{ shown.value }}</span>
    @if (shown.share !== null) {
      <div class="scale" aria-hidden="true">
        <div class="bar"><i [style.left.%]="100 * shown.share"></i></div>
        <span>{{ shown.ends[0] }}</span><span>{{ shown.ends[1] }}</span>
      </div>
    }
    @if (shown.marks !== null) {
      <span class="marks"
        ><b class="number">{{ shown.marks | number: '1.0-1' }}</b>
        <span class="muted"> of {{ shown.weight }}</span></span
      >
    }
  `,
  styles: `
    :host {
      display: grid;
      grid-template-columns: 1.5rem minmax(0, 1fr) 6rem 11rem 5.5rem;
      gap: 0.25rem 1rem;
      align-items: start;
      padding: 0.7rem 0;
      border-top: 1px solid var(--rule);
    }
    p {
      margin: 0;
    }
    .value {
      font-size: 1.1rem;
      font-weight: 600;
      text-align: right;
    }
    .lost {
      color: var(--vermilion);
    }
    .scale {
      display: grid;
      grid-template-columns: 1fr auto;
      gap: 0.2rem;
      padding-top: 0.55rem;
      color: var(--muted);
      font-size: 0.78rem;
    }
    .bar {
      position: relative;
      grid-column: 1 / -1;
      height: 7px;
      border-radius: 4px;
      background: linear-gradient(to right, var(--rule), var(--pine));
    }
    i {
      position: absolute;
      top: -5px;
      width: 4px;
      height: 17px;
      margin-left: -2px;
      border-radius: 2px;
      background: var(--ink);
    }
    .marks {
      text-align: right;
      white-space: nowrap;
    }
    .marks b {
      font-size: 1.1rem;
    }
    @media (width < 720px) {
      :host {
        grid-template-columns: 1.5rem minmax(0, 1fr) auto;
      }
      .scale {
        grid-column: 2;
      }
    }
  `,
  imports: [DecimalPipe],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ScoreLine {
  readonly line = input.required<ResultLine>();
}
