import {ExerciseService} from '../features/exercises/exercise-service';
import {PeopleService} from '../features/people/people-service';
import {type DemoStep} from './demo-step';
import {STOP_WITHOUT_A_LOOP} from './documents/stop-without-a-loop';
import {passingLog} from './documents/stop-without-a-loop-logs';
import {peopleDemo} from './people';

/** Each firm's instructor publishes the library: every firm has its own copy. */
const INSTRUCTORS = ['helen.marsh@harrow-lane.example', 'paul.wick@tarn-mill.example'];

export const exercisesDemo: DemoStep = {
  name: 'exercises',
  after: [peopleDemo],
  async run({db}) {
    const people = new PeopleService(db);
    const exercises = new ExerciseService(db);
    for (const email of INSTRUCTORS) {
      const instructor = await people.findByEmail(email);
      if (!instructor) continue; // made inactive since
      await exercises.publish(instructor, STOP_WITHOUT_A_LOOP, passingLog().entries);
    }
  },
};
