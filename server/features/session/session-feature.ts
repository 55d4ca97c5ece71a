import {
  readSession,
  type SessionState,
  signIn,
  signOut,
  updatePreferences,
} from '#shared/session/session';
import {type Feature} from '../../feature';
import {giveToken} from '../../http/forgery';
import {mount, mountPublic, type Visit} from '../../http/mount';
import {PeopleService} from '../people/people-service';
import {SignInLimit} from './sign-in-limit';
import {beginSession, endSession} from './session-change';
import {SessionService} from './session-service';

export const sessionFeature: Feature = {
  mount(router, {config, db}) {
    const people = new PeopleService(db);
    const session = new SessionService(people, new SignInLimit(db), config.isDemo);
    const stateFor = ({req, res}: Visit): Promise<SessionState> => {
      giveToken(req, res);
      return session.describe(req.user);
    };

    mountPublic(router, readSession, (input, visit) => stateFor(visit));
    mountPublic(router, signIn, async ({body}, visit) => {
      await beginSession(visit.req, await session.signIn(body, visit.req.ip ?? ''));
      return stateFor(visit);
    });
    mountPublic(router, signOut, async (input, visit) => {
      await endSession(visit.req);
      return stateFor(visit);
    });
    mount(router, updatePreferences, ({body}, caller) => session.updatePreferences(caller, body));
  },
};
