import {useTestServer} from '../../server/test-support/test-server';
import {filesBelow, read} from '../architecture/files';
import {callOf, type NamedEndpoint, sharedEndpoints} from './endpoints';

describe('the endpoints of shared', () => {
  const server = useTestServer();
  let endpoints: NamedEndpoint[];
  beforeAll(async () => (endpoints = await sharedEndpoints()));

  /** Routes that the running server has, read from its router. */
  function mounted(): string[] {
    return server().app.api.stack.flatMap(({route}) =>
      route ? route.stack.map(({method}) => callOf({method, path: route.path})) : [],
    );
  }

  it('are all mounted', () => {
    const calls = new Set(mounted());

    const missing = endpoints.filter(({endpoint}) => !calls.has(callOf(endpoint)));

    expect(missing.map(({name}) => name)).toEqual([]);
    expect(endpoints.length).toBeGreaterThan(5);
  });

  it('are all the server has: no route goes around them', () => {
    const described = new Set(endpoints.map(({endpoint}) => callOf(endpoint)));

    expect(mounted().filter((call) => !described.has(call))).toEqual([]);
  });

  it('differ in method or path', () => {
    const calls = endpoints.map(({endpoint}) => callOf(endpoint));

    expect(calls.filter((call, index) => calls.indexOf(call) !== index)).toEqual([]);
  });

  it('are called by the client, but for those of machines', () => {
    const forMachines = ['readHealth', 'readReadiness', 'readOpenApi'];
    const client = filesBelow(['src'])
      .filter((file) => /(?<!\.spec)\.ts$/.test(file))
      .map(read)
      .join('\n');

    const unused = endpoints.filter(({name}) => !new RegExp(`\\b${name}\\b`).test(client));

    expect(unused.map(({name}) => name).filter((name) => !forMachines.includes(name))).toEqual([]);
  });
});
