import {
  type Me,
  type Preferences,
  type SessionState,
  type SignInDraft,
} from '#shared/session/session';
import {type Caller} from '../../caller';
import {AppError} from '../../errors';
import {type PeopleService} from '../people/people-service';
import {type SignInLimit} from './sign-in-limit';

/** Who is signed in. */
export class SessionService {
  constructor(
    private readonly people: PeopleService,
    private readonly limit: SignInLimit,
    private readonly showsDemo: boolean,
  ) {}

  async describe(caller: Caller | undefined): Promise<SessionState> {
    const me = caller ? await this.people.getSelf(caller) : null;
    const demoAccounts = this.showsDemo ? await this.people.listDemoAccounts() : [];
    return {me, demoAccounts};
  }

  /** The person with this address and password; says the same to a wrong password and an unknown address. */
  async signIn({email, password}: SignInDraft, networkAddress: string): Promise<Caller> {
    await this.limit.spend(networkAddress, email);
    const caller = await this.people.findBySignIn(email, password);
    if (!caller) {
      throw new AppError('invalid-input', {detail: 'E-mail address or password is not right.'});
    }
    await this.limit.forgive(networkAddress, email);
    return caller;
  }

  updatePreferences(caller: Caller, preferences: Preferences): Promise<Me> {
    return this.people.updatePreferences(caller, preferences);
  }
}
