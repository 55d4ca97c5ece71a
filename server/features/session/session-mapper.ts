import {type Me, PersonId, type SessionState} from '#shared/session/session';
import {DEMO_PASSWORD} from '../people/demo-password';
import {type PersonEntity} from '../people/person-entity';

export function toMe({id, name, email, role, organisation, preferences}: PersonEntity): Me {
  return {
    id: PersonId.parse(id),
    name,
    email,
    role,
    organisation: {id: organisation.id, name: organisation.name, isDemo: organisation.isDemo},
    preferences,
  };
}

export function toDemoAccount(person: PersonEntity): SessionState['demoAccounts'][number] {
  const {email, name, role, organisation} = person;
  return {email, name, role, organisation: organisation.name, password: DEMO_PASSWORD};
}
