import {ChangeDetectionStrategy, Component, computed, input} from '@angular/core';
import {type ExerciseToRun} from '#shared/exercises/exercise';
import {CAUTIONS} from '#shared/wording/cautions';

interface Block {
  readonly isList: boolean;
  readonly lines: readonly string[];
}

/** What is to be done, in plain text and lists, and the cautions that belong to it. */
@Component({
  selector: 'app-brief',
  template: `
    @for (block of blocks(); track $index) {
      @if (block.isList) {
        <ul>
          @for (line of block.lines; track $index) {
            <li>{{ line }}</li>
          }
        </ul>
      } @else {
        @for (line of block.lines; track $index) {
          <p>{{ line }}</p>
        }
      }
    }
    <aside aria-label="Cautions">
      @for (caution of cautions(); track $index) {
        <p class="muted">{{ caution }}</p>
      }
    </aside>
  `,
  styles: `
    :host {
      display: block;
      max-width: 40rem;
    }
    p {
      margin: 0 0 0.6rem;
    }
    ul {
      margin: 0 0 0.6rem;
      padding-left: 1.2rem;
    }
    aside {
      margin: 1rem 0;
      padding-left: 0.9rem;
      border-left: 3px solid var(--rule);
      font-size: 0.9rem;
    }
    aside p {
      margin: 0 0 0.25rem;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Brief {
  readonly exercise = input.required<ExerciseToRun>();

  protected readonly blocks = computed(() => blocksOf(this.exercise().brief));
  protected readonly cautions = computed(() =>
    this.exercise().cautions.flatMap((number) => CAUTIONS[number] ?? []),
  );
}

/** A line that begins with "- " is a list item. */
function blocksOf(text: string): Block[] {
  const blocks: {isList: boolean; lines: string[]}[] = [];
  for (const line of text.split('\n')) {
    const isList = line.startsWith('- ');
    const shown = isList ? line.slice(2) : line;
    const last = blocks.at(-1);
    if (last?.isList === isList) last.lines.push(shown);
    else blocks.push({isList, lines: [shown]});
  }
  return blocks;
}
