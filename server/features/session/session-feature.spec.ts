import {useTestServer} from '../../test-support/test-server';

describe('the session', () => {
  const server = useTestServer();

  describe('answers', () => {
    it('with nobody before sign-in', async () => {
      const agent = await server().visitor();

      const {body} = await agent.get('/api/session').expect(200);

      expect(body).toEqual({me: null, demoAccounts: []});
    });

    it('with the person after it', async () => {
      const {agent, caller, email} = await server().signedInAs('instructor');

      const {body} = await agent.get('/api/session').expect(200);

      expect(body.me).toEqual(
        jasmine.objectContaining({id: caller.personId, role: 'instructor', email}),
      );
    });
  });
});
