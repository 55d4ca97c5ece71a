import {type DataSource, type EntityManager, QueryFailedError} from 'typeorm';
import {type Role} from '#shared/permissions';
import {type Me, type Preferences} from '#shared/session/session';
import {type Caller} from '../../caller';
import {newId} from '../../db/new-id';
import {AppError} from '../../errors';
import {OrganisationEntity} from './organisation-entity';
import {hashPassword, isPasswordOf} from './password';
import {PersonEntity} from './person-entity';
import {type DemoAccount, toCaller, toDemoAccount, toMe} from './person-mapper';

/** A person about to be made. */
export interface PersonDraft {
  readonly email: string;
  readonly name: string;
  readonly role: Role;
  readonly password: string;
}

/** Who there is, and who may come in. */
export class PeopleService {
  constructor(private readonly db: DataSource) {}

  /** The person with this address and password; who has left is refused like a stranger. */
  async findBySignIn(email: string, password: string): Promise<Caller | undefined> {
    const person = await this.db.getRepository(PersonEntity).findOneBy({email, active: true});
    const isRight = await isPasswordOf(person?.passwordHash, password);
    return person && isRight ? toCaller(person) : undefined;
  }

  /** The caller a session belongs to, as things are now; nobody once the person has left. */
  async findCaller(personId: string): Promise<Caller | undefined> {
    const person = await this.db.getRepository(PersonEntity).findOne({
      select: {id: true, organisationId: true, role: true},
      where: {id: personId, active: true},
    });
    return person ? toCaller(person) : undefined;
  }

  /** The caller, as the caller's own page shows it. */
  async getSelf(caller: Caller): Promise<Me> {
    const {personId: id, organisationId} = caller;
    const person = await this.db
      .getRepository(PersonEntity)
      .findOne({where: {id, organisationId}, relations: {organisation: true}});
    if (!person) throw new AppError('not-signed-in');
    return toMe(person);
  }

  async updatePreferences(caller: Caller, preferences: Preferences): Promise<Me> {
    const {personId: id, organisationId} = caller;
    await this.db.getRepository(PersonEntity).update({id, organisationId}, {preferences});
    return this.getSelf(caller);
  }

  /** Accounts of the demo organisations, for the sign-in page of a demo. */
  async listDemoAccounts(): Promise<DemoAccount[]> {
    const people = await this.db.getRepository(PersonEntity).find({
      where: {organisation: {isDemo: true}, active: true},
      relations: {organisation: true},
      order: {createdAt: 'asc', id: 'asc'},
    });
    return people.map(toDemoAccount);
  }

  /** Who has this address, whether signed in or not: for tools and the demo, never for a call. */
  async findByEmail(email: string): Promise<Caller | undefined> {
    const person = await this.db.getRepository(PersonEntity).findOneBy({email});
    return person ? this.findCaller(person.id) : undefined;
  }

  async findDemoOrganisation(name: string): Promise<string | undefined> {
    const found = await this.db.getRepository(OrganisationEntity).findOneBy({name, isDemo: true});
    return found?.id;
  }

  /** Makes an organisation with its first administrator, or neither. */
  async foundOrganisation(name: string, administrator: PersonDraft): Promise<void> {
    await this.db.transaction(async (manager) => {
      const organisationId = await this.createOrganisation(name, false, manager);
      await this.createPerson(organisationId, administrator, manager);
    });
  }

  async createOrganisation(
    name: string,
    isDemo = false,
    manager: EntityManager = this.db.manager,
  ): Promise<string> {
    const id = newId();
    await manager.getRepository(OrganisationEntity).insert({id, name, isDemo});
    return id;
  }

  /** Makes a person; an address that exists anywhere is refused as in use. */
  async createPerson(
    organisationId: string,
    draft: PersonDraft,
    manager: EntityManager = this.db.manager,
  ): Promise<string> {
    const {name, role, password} = draft;
    const email = draft.email.toLowerCase();
    const id = newId();
    const passwordHash = await hashPassword(password);
    try {
      await manager
        .getRepository(PersonEntity)
        .insert({id, organisationId, email, name, role, passwordHash});
    } catch (error) {
      // QueryFailedError: unique_violation of the address
      if (!isTakenAddress(error)) throw error;
      throw new AppError('in-use', {detail: `The address ${email} is in use.`});
    }
    return id;
  }
}

function isTakenAddress(error: unknown): boolean {
  if (!(error instanceof QueryFailedError)) return false;
  return (error.driverError as {constraint?: string}).constraint === 'person_email_key';
}
