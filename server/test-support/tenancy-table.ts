import {type ProblemCode} from '#shared/problem';
import {PASSWORD} from './test-server';
import {type Visitor, type World} from './tenancy-world';

/** How a route is called: what stands for its parameters, and what is sent. */
export interface Call {
  readonly params?: Readonly<Record<string, string>>;
  readonly query?: Readonly<Record<string, string>>;
  readonly body?: object;
}

export type Answer = 'ok' | ProblemCode;

/** One route: what each visitor is answered. */
export interface Row {
  /** Makes the row that is tried, as the owner's, anew for each visitor; without it the call needs none. */
  readonly call?: (world: World) => Call | Promise<Call>;
  readonly answers: Readonly<Record<Visitor, Answer>>;
  /** Whether it changes who is signed in. */
  readonly changesSession?: boolean;
}

/** The same for all, but for those named. */
export function all(answer: Answer, but: Partial<Record<Visitor, Answer>> = {}): Row['answers'] {
  return {
    nobody: answer,
    owner: answer,
    'own trainee': answer,
    'own technician': answer,
    'own instructor': answer,
    'own administrator': answer,
    'foreign trainee': answer,
    'foreign technician': answer,
    'foreign instructor': answer,
    'foreign administrator': answer,
    ...but,
  };
}

const signedIn = all('ok', {nobody: 'not-signed-in'});

/** Every route of the server, `METHOD /path` in alphabetical order; one without a row here fails the test. */
export const TENANCY: Readonly<Record<string, Row>> = {
  'DELETE /session': {answers: all('ok'), changesSession: true},
  'GET /events': {
    call: () => ({query: {topics: 'attempt:0198a000-0000-7000-8000-000000000000'}}),
    answers: all('not-found', {nobody: 'not-signed-in'}),
  },
  'GET /health': {answers: all('ok')},
  'GET /health/ready': {answers: all('ok')},
  'GET /openapi.json': {answers: signedIn},
  'GET /session': {answers: all('ok')},
  'POST /session': {
    call: ({owner}) => ({body: {email: owner.email, password: PASSWORD}}),
    answers: all('ok'),
    changesSession: true,
  },
  'PUT /session/preferences': {
    call: () => ({body: {units: 'us', theme: 'dark'}}),
    answers: signedIn,
  },
};
