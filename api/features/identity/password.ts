import { hash, verify } from "@node-rs/argon2";

/** Argon2id with 19 MiB, two passes and one lane: the OWASP Password Storage Cheat Sheet's first recommendation. */
const PARAMETERS = { memoryCost: 19 * 1024, timeCost: 2, parallelism: 1 } as const;

export function hashPassword(password: string): Promise<string> {
  return hash(password, PARAMETERS);
}

let unknownAccountHash: Promise<string> | null = null;

/**
 * Checks a password. Without an account it does the same work against a hash that nothing matches, so that the time
 * taken doesn't tell whether an address has an account.
 */
export async function checkPassword(passwordHash: string | undefined, password: string): Promise<boolean> {
  unknownAccountHash ??= hashPassword(crypto.randomUUID());
  const matches = await verify(passwordHash ?? (await unknownAccountHash), password);
  return matches && passwordHash !== undefined;
}
