import {hash, verify} from '@node-rs/argon2';

/** argon2id is the package's default kind; 19 MiB, two passes, one lane. */
const COST = {memoryCost: 19 * 1024, timeCost: 2, parallelism: 1};

/** Hash of a word nobody has: checking against it takes as long as checking a real one. */
let nobodys: Promise<string> | undefined;

export function hashPassword(password: string): Promise<string> {
  return hash(password, COST);
}

/** Whether the password is the one of `passwordHash`; without one it takes the same time and says no. */
export async function isPasswordOf(
  passwordHash: string | undefined,
  password: string,
): Promise<boolean> {
  if (passwordHash !== undefined) return verify(passwordHash, password);
  nobodys ??= hashPassword('nobody has this password');
  await verify(await nobodys, password);
  return false;
}
