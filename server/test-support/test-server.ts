import {createServer, type Server} from 'node:http';
import {type AddressInfo} from 'node:net';
import supertest from 'supertest';
import {type DataSource} from 'typeorm';
import {type Role} from '#shared/permissions';
import {type App, makeApp} from '../app';
import {type AppParts} from '../app-parts';
import {type Caller} from '../caller';
import {readConfig} from '../config';
import {makeDataSource} from '../db/data-source';
import {EventHub} from '../events/event-hub';
import {Listener} from '../events/listener';
import {PeopleService} from '../features/people/people-service';
import {closeServer} from '../http/close-server';
import {makeJobSender} from '../jobs/boss';
import {makeLog} from '../log';
import {makeTestDatabase} from './test-database';
import {testSettings} from './test-settings';

export type Agent = ReturnType<typeof supertest.agent>;
/** Of every person made here. */
export const PASSWORD = 'a password for tests';

/** Somebody signed in: `agent` sends the cookie and the token of the session. */
export interface SignedIn {
  readonly agent: Agent;
  readonly caller: Caller;
  readonly email: string;
  /** The session's cookie, for calls that do not go through the agent. */
  readonly cookie: string;
}

/** A server on loopback with a database of its own. */
export class TestServer {
  private people = 0;

  constructor(
    readonly parts: AppParts,
    readonly app: App,
    readonly http: Server,
    /** What it logged, a JSON line each. */
    readonly logged: readonly string[],
    /** Stops it and drops the database. */
    readonly close: () => Promise<void>,
  ) {}

  get db(): DataSource {
    return this.parts.db;
  }

  get url(): string {
    return `http://127.0.0.1:${(this.http.address() as AddressInfo).port}`;
  }

  /** An agent that has read the session: it has a token, but nobody is signed in. */
  async visitor(): Promise<Agent> {
    const agent = supertest.agent(this.http);
    keepToken(agent, await agent.get('/api/session').expect(200));
    return agent;
  }

  /** Makes an organisation; its id. */
  organisation(name = 'Sample Converting'): Promise<string> {
    return new PeopleService(this.db).createOrganisation(name);
  }

  /** Makes a person of this role, in a new organisation unless one is given. */
  async person(role: Role, organisationId?: string): Promise<Omit<SignedIn, 'agent' | 'cookie'>> {
    organisationId ??= await this.organisation();
    const email = `${role}-${(this.people += 1)}@people.example`;
    const draft = {email, name: `Sample ${role}`, role, password: PASSWORD};
    const personId = await new PeopleService(this.db).createPerson(organisationId, draft);
    return {caller: {personId, organisationId, role}, email};
  }

  /** Signs in with the address of a person made here. */
  async signIn(email: string): Promise<Pick<SignedIn, 'agent' | 'cookie'>> {
    const agent = await this.visitor();
    const reply = await agent.post('/api/session').send({email, password: PASSWORD}).expect(200);
    keepToken(agent, reply);
    return {agent, cookie: sessionCookieOf(reply)};
  }

  /** Makes a person of this role, in a new organisation unless one is given, and signs in. */
  async signedInAs(role: Role, organisationId?: string): Promise<SignedIn> {
    const person = await this.person(role, organisationId);
    return {...person, ...(await this.signIn(person.email))};
  }
}

/** Makes a server before the specs of this file and closes it after them. */
export function useTestServer(settings: Record<string, string> = {}): () => TestServer {
  let server: TestServer | undefined;
  beforeAll(async () => (server = await startTestServer(settings)));
  afterAll(() => server?.close());
  return () => {
    if (!server) throw new Error('the server exists only while specs run');
    return server;
  };
}

export async function startTestServer(settings: Record<string, string> = {}): Promise<TestServer> {
  const database = await makeTestDatabase();
  const config = readConfig(testSettings(database.url, settings));
  const logged: string[] = [];
  const log = makeLog(config.logLevel, {write: (line) => void logged.push(line)});
  const db = await makeDataSource(config.databaseUrl).initialize();
  const events = new EventHub();
  const listener = new Listener(config.databaseUrl, events, log);
  await listener.start();
  const parts = {config, db, jobs: makeJobSender(), events, log, now: () => new Date()};
  const app = makeApp(parts);
  const http = createServer(app.express);
  await new Promise<void>((resolve) => http.listen(0, '127.0.0.1', resolve));
  return new TestServer(parts, app, http, logged, async () => {
    await closeServer(http, events);
    await listener.stop();
    await db.destroy();
    await database.drop();
  });
}

/** Sends the session's token with every call from now on, as a page does. */
export function keepToken(agent: Agent, {headers}: supertest.Response): void {
  const token = tokenOf(headers);
  if (token !== undefined) agent.set('X-XSRF-TOKEN', token);
}

function sessionCookieOf({headers}: supertest.Response): string {
  const cookies = headers['set-cookie'] as unknown as string[];
  const cookie = cookies.find((each) => each.startsWith('evenspan-session='));
  if (cookie === undefined) throw new Error('the reply sets no session cookie');
  return cookie.split(';')[0] ?? '';
}

export function tokenOf(headers: Record<string, unknown>): string | undefined {
  const cookies = (headers['set-cookie'] ?? []) as string[];
  return cookies.map((cookie) => /^XSRF-TOKEN=([^;]+)/.exec(cookie)?.[1]).find(Boolean);
}
