import {listExercises, readExercise} from '#shared/exercises/exercise';
import {type Feature} from '../../feature';
import {mount} from '../../http/mount';
import {OwnAttemptsService} from '../attempts/own-attempts-service';
import {ExerciseEntity} from './exercise-entity';
import {ExerciseService} from './exercise-service';
import {ExerciseVersionEntity} from './exercise-version-entity';
import {LibraryService} from './library-service';

export const exercisesFeature: Feature = {
  entities: [ExerciseEntity, ExerciseVersionEntity],
  mount(router, {db}) {
    const library = new LibraryService(new ExerciseService(db), new OwnAttemptsService(db));

    mount(router, listExercises, (input, caller) => library.list(caller));
    mount(router, readExercise, ({params}, caller) => library.get(caller, params.exerciseId));
  },
};
