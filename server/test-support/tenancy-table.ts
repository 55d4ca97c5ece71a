import {type ProblemCode} from '#shared/problem';
import {type Made, publishExercise, startAttempt} from './attempt-maker';
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

/** Everybody's attempts of one's own organisation. */
const readersOfOthers = all('not-allowed', {
  nobody: 'not-signed-in',
  'own instructor': 'ok',
  'own administrator': 'ok',
  'foreign instructor': 'ok',
  'foreign administrator': 'ok',
});
/** One attempt: the owner's, and those of the organisation who may read others'. */
const readersOfOne = all('not-found', {
  nobody: 'not-signed-in',
  owner: 'ok',
  'own instructor': 'ok',
  'own administrator': 'ok',
});
/** One attempt: nobody writes to it but its owner. */
const writersOfOne = all('not-found', {
  nobody: 'not-signed-in',
  owner: 'ok',
  'own administrator': 'not-allowed',
  'foreign administrator': 'not-allowed',
});

async function makeAttempt({server, owner}: World): Promise<Made> {
  const exerciseId = await publishExercise(server, owner.caller);
  return startAttempt(server, owner, exerciseId);
}
/** A call at an attempt of the owner's, with what is sent. */
const atAttempt =
  (bodyOf?: (made: Made) => object) =>
  async (world: World): Promise<Call> => {
    const made = await makeAttempt(world);
    return {params: {attemptId: made.id}, ...(bodyOf && {body: bodyOf(made)})};
  };

/** Every route of the server, `METHOD /path` in alphabetical order; one without a row here fails the test. */
export const TENANCY: Readonly<Record<string, Row>> = {
  'DELETE /session': {answers: all('ok'), changesSession: true},
  'GET /attempts': {answers: readersOfOthers},
  'GET /attempts.csv': {answers: readersOfOthers},
  'GET /attempts/:attemptId': {call: atAttempt(), answers: readersOfOne},
  'GET /attempts/:attemptId/log': {call: atAttempt(), answers: readersOfOne},
  'GET /attempts/mine': {
    answers: all('ok', {
      nobody: 'not-signed-in',
      'own administrator': 'not-allowed',
      'foreign administrator': 'not-allowed',
    }),
  },
  'GET /events': {
    call: () => ({query: {topics: 'attempt:0198a000-0000-7000-8000-000000000000'}}),
    answers: all('not-found', {nobody: 'not-signed-in'}),
  },
  'GET /exercises': {answers: signedIn},
  'GET /exercises/:exerciseId': {
    call: async ({server, owner}) => ({
      params: {exerciseId: await publishExercise(server, owner.caller)},
    }),
    answers: all('ok', {
      nobody: 'not-signed-in',
      'foreign trainee': 'not-found',
      'foreign technician': 'not-found',
      'foreign instructor': 'not-found',
      'foreign administrator': 'not-found',
    }),
  },
  'GET /health': {answers: all('ok')},
  'GET /health/ready': {answers: all('ok')},
  'GET /openapi.json': {answers: signedIn},
  'GET /session': {answers: all('ok')},
  'POST /attempts/:attemptId/batches': {
    call: atAttempt(({writerKey}) => ({
      writerKey,
      number: 1,
      throughTick: 1,
      entries: [{n: 1, tick: 1, kind: 'pause'}],
    })),
    answers: writersOfOne,
  },
  'POST /attempts/:attemptId/beats': {
    call: atAttempt(({writerKey}) => ({writerKey, throughTick: 1})),
    answers: writersOfOne,
  },
  'POST /session': {
    call: ({owner}) => ({body: {email: owner.email, password: PASSWORD}}),
    answers: all('ok'),
    changesSession: true,
  },
  'PUT /attempts/:attemptId': {
    call: atAttempt(({exerciseId, writerKey}) => ({exerciseId, writerKey})),
    answers: writersOfOne,
  },
  'PUT /attempts/:attemptId/writer': {
    call: atAttempt(({writerKey}) => ({writerKey})),
    answers: writersOfOne,
  },
  'PUT /session/preferences': {
    call: () => ({body: {units: 'us', theme: 'dark'}}),
    answers: signedIn,
  },
};
