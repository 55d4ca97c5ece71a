import {createHash} from 'node:crypto';
import {RateLimiterPostgres, RateLimiterRes} from 'rate-limiter-flexible';
import {type DataSource} from 'typeorm';
import {poolOf} from '../../db/pool';
import {AppError} from '../../errors';

/** Tries of one account from one network address, within … */
const PER_ACCOUNT = {points: 10, duration: 15 * 60};
/** … and of all accounts from one network address: a whole group sits behind one. */
const PER_NETWORK = {points: 300, duration: 15 * 60};

/** Counts sign-in tries in PostgreSQL, so that all instances count together. */
export class SignInLimit {
  private readonly byAccount: RateLimiterPostgres;
  private readonly byNetwork: RateLimiterPostgres;

  constructor(db: DataSource) {
    const shared = {
      storeClient: poolOf(db),
      storeType: 'client',
      tableName: 'sign_in_limit',
      tableCreated: true, // by a migration
    };
    this.byAccount = new RateLimiterPostgres({...shared, ...PER_ACCOUNT, keyPrefix: 'account'});
    this.byNetwork = new RateLimiterPostgres({
      ...shared,
      ...PER_NETWORK,
      keyPrefix: 'network',
      clearExpiredByTimeout: false, // the other one clears the table of both
    });
  }

  /** Counts one try, before the password is looked at; refuses one too many. */
  async spend(networkAddress: string, email: string): Promise<void> {
    try {
      await this.byNetwork.consume(networkAddress);
      await this.byAccount.consume(keyOf(networkAddress, email));
    } catch (refused) {
      if (!(refused instanceof RateLimiterRes)) throw refused; // the database is gone
      const retryAfterS = Math.ceil(refused.msBeforeNext / 1000);
      throw new AppError('too-many-requests', {
        detail: `Too many tries. Wait ${Math.ceil(retryAfterS / 60)} minutes and try again.`,
        retryAfterS,
      });
    }
  }

  /** A right password clears the account's count. */
  async forgive(networkAddress: string, email: string): Promise<void> {
    await this.byAccount.delete(keyOf(networkAddress, email));
  }
}

/** A hash, since an address may be longer than a key; and nobody's address stays in a table of tries. */
function keyOf(networkAddress: string, email: string): string {
  return createHash('sha256').update(`${networkAddress} ${email}`).digest('base64url');
}
