import {ROLES, type Role} from '#shared/permissions';
import {type Agent, type SignedIn, type TestServer} from './test-server';

/**
 * Who tries a route: somebody signed out; the one whose row it is, a trainee; and one of each role, of the
 * row's own organisation and of a foreign one.
 */
export const VISITORS = [
  'nobody',
  'owner',
  ...ROLES.map((role) => `own ${role}` as const),
  ...ROLES.map((role) => `foreign ${role}` as const),
] as const;
export type Visitor = (typeof VISITORS)[number];

/** Two organisations with their people. */
export interface World {
  readonly server: TestServer;
  /** Whose rows are tried. */
  readonly owner: SignedIn;
  readonly people: Readonly<Record<`${'own' | 'foreign'} ${Role}`, SignedIn>>;
  /** What nobody of the foreign organisation may read anywhere; a row adds the ids it makes. */
  readonly hidden: string[];
}

export async function makeWorld(server: TestServer): Promise<World> {
  const [own, foreign] = [await server.organisation('Own'), await server.organisation('Foreign')];
  const people: Partial<Record<string, SignedIn>> = {};
  for (const role of ROLES) {
    people[`own ${role}`] = await server.signedInAs(role, own);
    people[`foreign ${role}`] = await server.signedInAs(role, foreign);
  }
  const owner = await server.signedInAs('trainee', own);
  const hidden = [own, owner.caller.personId, owner.email];
  return {server, owner, people: people as World['people'], hidden};
}

/** The visitor's agent; a new one, when the call would change the session of a shared one. */
export async function agentOf(
  {server, owner, people}: World,
  visitor: Visitor,
  isNew: boolean,
): Promise<Agent> {
  if (visitor === 'nobody') return server.visitor();
  const person = visitor === 'owner' ? owner : people[visitor];
  return isNew ? (await server.signIn(person.email)).agent : person.agent;
}
