import {useTestServer, type Agent} from '../../test-support/test-server';

const TRIES_OF_ACCOUNT = 10;
const TRIES_OF_NETWORK = 300;

describe('the limit of sign-in tries', () => {
  const server = useTestServer({TRUSTED_PROXIES: '1'});
  const tryIn = (agent: Agent, email: string, address: string, password = 'wrong') =>
    agent.post('/api/session').set('X-Forwarded-For', address).send({email, password});

  it('refuses the eleventh of one account, right or wrong, and says how long to wait', async () => {
    const {email} = await server().person('trainee');
    const agent = await server().visitor();
    for (let n = 0; n < TRIES_OF_ACCOUNT; n++) await tryIn(agent, email, '192.0.2.1').expect(400);

    const {body, headers} = await tryIn(agent, email, '192.0.2.1', 'a password for tests').expect(
      429,
    );

    expect(body.code).toBe('too-many-requests');
    expect(body.retryAfterS).toBeGreaterThan(800);
    expect(body.retryAfterS).toBeLessThanOrEqual(900);
    expect(headers['retry-after']).toBe(String(body.retryAfterS));
  });

  it('counts by account and by network address', async () => {
    const [one, other] = [await server().person('trainee'), await server().person('trainee')];
    const agent = await server().visitor();
    for (let n = 0; n <= TRIES_OF_ACCOUNT; n++) await tryIn(agent, one.email, '192.0.2.2');

    await tryIn(agent, one.email, '192.0.2.2').expect(429);
    await tryIn(agent, other.email, '192.0.2.2').expect(400);
    await tryIn(agent, one.email, '192.0.2.3').expect(400);
  });

  it('forgets the wrong ones after a right one', async () => {
    const {email} = await server().person('trainee');
    const agent = await server().visitor();
    for (let n = 0; n < TRIES_OF_ACCOUNT - 1; n++) await tryIn(agent, email, '192.0.2.4');
    await tryIn(agent, email, '192.0.2.4', 'a password for tests').expect(200);

    const again = await server().visitor();

    await tryIn(again, email, '192.0.2.4').expect(400);
  });

  it('counts an address as long as they may be', async () => {
    const agent = await server().visitor();
    const email = `${'x'.repeat(239)}@people.example`;

    const {body} = await tryIn(agent, email, '2001:db8:ffff:ffff:ffff:ffff:ffff:ffff').expect(400);

    expect(body.code).toBe('invalid-input');
    expect(body.errors).toEqual([]);
  });

  it('is looser for a network address, behind which a whole group may sit', async () => {
    const agent = await server().visitor();
    await server().db.query(
      `insert into sign_in_limit (key, points, expire) values ('network:192.0.2.5', $1, $2)`,
      [TRIES_OF_NETWORK - 1, Date.now() + 60_000],
    );

    await tryIn(agent, 'first@people.example', '192.0.2.5').expect(400);
    await tryIn(agent, 'second@people.example', '192.0.2.5').expect(429);
  });
});
