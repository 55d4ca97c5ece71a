import {ChangeDetectionStrategy, Component, computed, input} from '@angular/core';
import {type Score} from '#sim-core/index';
import {type ExerciseToRun} from '#shared/exercises/exercise';
import {type UnitSystem} from '#shared/units';
import {criterionSentence, criterionValue} from '#shared/wording/criteria';

/** What is marked, as sentences; with a score so far when there is one. */
@Component({
  selector: 'app-criteria-list',
  template: `
    <ol>
      @for (row of rows(); track $index) {
        <li>
          <span>{{ row.sentence }}</span>
          <span class="marks">
            @if (row.value) {
              <span class="number">{{ row.value }}</span>
            }
            @if (row.weight !== null) {
              <span class="muted">
                @if (row.marks !== null) {
                  <b class="number">{{ row.marks }}</b> of
                }
                {{ row.weight }} marks</span
              >
            }
          </span>
        </li>
      }
    </ol>
  `,
  styles: `
    ol {
      margin: 0 0 1rem;
      padding: 0;
      list-style: none;
    }
    li {
      display: flex;
      gap: 0.75rem;
      justify-content: space-between;
      padding: 0.4rem 0;
      border-top: 1px solid var(--rule);
      font-size: 0.92rem;
    }
    .marks {
      display: flex;
      flex: none;
      gap: 0.6rem;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class CriteriaList {
  readonly exercise = input.required<ExerciseToRun>();
  readonly units = input<UnitSystem>('si');
  /** Marks so far, from what the controller measured; loops are not seen by it. */
  readonly interim = input<Score | null>(null);

  protected readonly rows = computed(() =>
    this.exercise().criteria.map((criterion, index) => {
      const result = this.interim()?.criteria[index];
      const isSeen = result != null && result.value !== null && criterion.measure !== 'loopM';
      return {
        sentence: criterionSentence(criterion, this.units()),
        weight: criterion.kind === 'measure' ? criterion.weight : null,
        value: isSeen ? criterionValue(criterion, result.value, this.units()) : '',
        marks: isSeen && criterion.kind === 'measure' ? result.marks : null,
      };
    }),
  );
}
