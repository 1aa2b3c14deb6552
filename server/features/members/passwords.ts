import { hash, verify } from '@node-rs/argon2';

/** argon2id is the library's default algorithm; its enum is ambient and cannot be named here. Cost: 64 MiB, three passes. */
const COST = { memoryCost: 65_536, timeCost: 3, parallelism: 1 } as const;

export async function hashPassword(password: string): Promise<string> {
  return hash(password.normalize('NFC'), COST);
}

let decoy: Promise<string> | null = null;

/**
 * True when the password fits. Without a hash (no such account) the same work is done against a decoy, so that the answer
 * takes the same time whether the account exists or not.
 */
export async function isPasswordRight(passwordHash: string | null, password: string): Promise<boolean> {
  decoy ??= hashPassword('no account has this password');
  const isRight = await verify(passwordHash ?? (await decoy), password.normalize('NFC'));
  return isRight && passwordHash !== null;
}
