import { Algorithm, hash, verify } from '@node-rs/argon2';

/** Argon2id as OWASP's cheat sheet asks at the least: 19 MiB, two passes, one lane. */
const PARAMETERS = { algorithm: Algorithm.Argon2id, memoryCost: 19_456, timeCost: 2, parallelism: 1 };

export function hashPassword(password: string): Promise<string> {
  return hash(password, PARAMETERS);
}

/** A hash of nothing anybody knows, so that an unknown address costs the same work as a known one. */
const decoy = hashPassword(crypto.randomUUID());

/** Whether the password belongs to the hash; without a hash, the same work and no. */
export async function passwordMatches(password: string, passwordHash: string | undefined): Promise<boolean> {
  const matches = await verify(passwordHash ?? (await decoy), password);
  return matches && passwordHash !== undefined;
}
