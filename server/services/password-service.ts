import { hash, verify } from '@node-rs/argon2';

/** The package's own defaults are those OWASP gives for argon2id: 19 MiB, two passes, one lane. */
export const hashPassword = (password: string): Promise<string> => hash(password);

let dummy: Promise<string> | undefined;
/** A hash nobody's password has, of the same cost as a real one. */
const dummyHash = (): Promise<string> => {
  dummy ??= hashPassword(crypto.randomUUID());
  return dummy;
};

/**
 * Whether the password is the one the hash was made of. Without a hash it works as long and answers no, so that
 * the time of the answer does not tell whether an address is known.
 */
export async function isPasswordRight(passwordHash: string | null, password: string): Promise<boolean> {
  const right = await verify(passwordHash ?? (await dummyHash()), password);
  return right && passwordHash !== null;
}
