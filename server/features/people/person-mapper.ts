import {type Me, PersonId, type SessionState} from '#shared/session/session';
import {type Caller} from '../../caller';
import {DEMO_PASSWORD} from './demo-password';
import {type PersonEntity} from './person-entity';

/** An account to try, as the sign-in page of a demo shows it. */
export type DemoAccount = SessionState['demoAccounts'][number];

export function toCaller({id, organisationId, role}: PersonEntity): Caller {
  return {personId: id, organisationId, role};
}

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

export function toDemoAccount(person: PersonEntity): DemoAccount {
  const {email, name, role, organisation} = person;
  return {email, name, role, organisation: organisation.name, password: DEMO_PASSWORD};
}
