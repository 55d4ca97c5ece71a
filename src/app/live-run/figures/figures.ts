import {ChangeDetectionStrategy, Component, computed, input} from '@angular/core';
import {type UnitSystem} from '#shared/units';
import {entryWords} from '#shared/wording/run';
import {type LiveRun} from '../live-run';
import {SAMPLE_S} from '../sample-period';
import {figuresOf, lastAct, type Yardstick} from './figures-of';

/** The numbers beside a trend, since the last act. */
@Component({
  selector: 'app-figures',
  template: `
    <h3>{{ title() }}</h3>
    <dl>
      @for (figure of figures(); track figure.name) {
        <div [class.out]="figure.isOut">
          <dt>{{ figure.name }}</dt>
          <dd>
            <span class="number">{{ figure.number }}</span>&ngsp;<span class="muted">{{
              figure.unit
            }}</span>
          </dd>
        </div>
      }
    </dl>
  `,
  styles: `
    h3 {
      color: var(--muted);
      font-size: 0.9rem;
      font-weight: 400;
    }
    dl {
      display: grid;
      grid-template-columns: repeat(auto-fit, minmax(6.4rem, 1fr));
      gap: 0.4rem 0.75rem;
      margin: 0.25rem 0 0;
      padding-top: 0.4rem;
      border-top: 1px solid var(--rule);
    }
    dt {
      color: var(--muted);
      font-size: 0.82rem;
      line-height: 1.2;
    }
    dd {
      margin: 0;
    }
    .number {
      font-size: 1.1rem;
      font-weight: 600;
    }
    .muted {
      font-size: 0.9rem;
    }
    .out .number {
      color: var(--vermilion);
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Figures {
  readonly run = input.required<LiveRun>();
  readonly yardstick = input.required<Yardstick>();
  readonly units = input<UnitSystem>('si');

  private readonly since = computed(() => lastAct(this.run().entries()));
  /** Changes whenever figures are due: the longer the span, the rarer, as each looks at every row of it. */
  private readonly pace = computed(() => {
    const tick = this.run().readOuts()?.tick ?? 0;
    const rows = tick - (this.since()?.tick ?? 0);
    const every = rows < 3000 ? 20 : rows < 12_000 ? 100 : 500;
    return this.run().pauseReason() === null ? Math.floor(tick / every) : -tick;
  });
  protected readonly figures = computed(() => {
    this.pace();
    return figuresOf(this.run().trace, this.since(), this.yardstick(), this.units());
  });
  protected readonly title = computed(() => {
    const since = this.since();
    if (since === null) return 'Figures since the beginning';
    return `Figures since “${entryWords(since, this.units()) ?? ''}” at ${(since.tick * SAMPLE_S).toFixed(1)} s`;
  });
}
