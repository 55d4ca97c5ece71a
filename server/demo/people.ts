import {type Role} from '#shared/permissions';
import {DEMO_PASSWORD} from '../features/people/demo-password';
import {PeopleService} from '../features/people/people-service';
import {type DemoStep} from './demo-step';

/** Invented firms and people. Other steps of the demo find them by these addresses. */
export const DEMO_PEOPLE = {
  'Harrow Lane Converting': [
    ['trainee', 'Ines Holt', 'ines.holt@harrow-lane.example'],
    ['trainee', 'Tom Asker', 'tom.asker@harrow-lane.example'],
    ['trainee', 'Priya Vale', 'priya.vale@harrow-lane.example'],
    ['technician', 'Jonas Reed', 'jonas.reed@harrow-lane.example'],
    ['instructor', 'Helen Marsh', 'helen.marsh@harrow-lane.example'],
    ['administrator', 'Omar Finch', 'omar.finch@harrow-lane.example'],
  ],
  'Tarn Mill Nonwovens': [
    ['trainee', 'Lena Birch', 'lena.birch@tarn-mill.example'],
    ['instructor', 'Paul Wick', 'paul.wick@tarn-mill.example'],
  ],
} as const satisfies Record<string, readonly (readonly [Role, string, string])[]>;

export const peopleDemo: DemoStep = {
  name: 'people',
  async run({db}) {
    const people = new PeopleService(db);
    for (const [firm, staff] of Object.entries(DEMO_PEOPLE)) {
      const organisationId =
        (await people.findDemoOrganisation(firm)) ?? (await people.createOrganisation(firm, true));
      for (const [role, name, email] of staff) {
        if (await people.findByEmail(email)) continue;
        await people.createPerson(organisationId, {role, name, email, password: DEMO_PASSWORD});
      }
    }
  },
};
