import type * as z from 'zod';
import {type ExerciseSummary, type readExercise} from '#shared/exercises/exercise';
import {type Caller} from '../../caller';
import {type OwnAttemptsService} from '../attempts/own-attempts-service';
import {toRun, toSummary} from './exercise-mapper';
import {type ExerciseService} from './exercise-service';

/** The exercises as the caller sees them: each with how the caller stands at it. */
export class LibraryService {
  constructor(
    private readonly exercises: ExerciseService,
    private readonly own: OwnAttemptsService,
  ) {}

  async list(caller: Caller): Promise<z.input<typeof ExerciseSummary>[]> {
    const mine = await this.own.standings(caller);
    const published = await this.exercises.listPublished(caller);
    return published.map(({exerciseId, exercise}) =>
      toSummary(exerciseId, exercise, mine.get(exerciseId)),
    );
  }

  async get(caller: Caller, id: string): Promise<z.input<typeof readExercise.reply>> {
    const {exerciseId, exercise} = await this.exercises.getPublished(caller, id);
    const mine = await this.own.standings(caller);
    return {
      summary: toSummary(exerciseId, exercise, mine.get(exerciseId)),
      exercise: toRun(exercise),
    };
  }
}
