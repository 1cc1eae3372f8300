import { inArray } from "drizzle-orm";
import { DEMO_ACCOUNTS, DEMO_PASSWORD } from "#shared/demo";
import type { Database } from "../../db/client";
import { users } from "../../db/schema/identity";
import { checkPassword } from "./password";

/**
 * Refuses to go on while somebody can sign in with the published demo password.
 *
 * @throws Error that says what to do
 */
export async function refuseDemoSecrets(db: Database): Promise<void> {
  const emails = DEMO_ACCOUNTS.map(({ email }) => email);
  const found = await db
    .select({ email: users.email, passwordHash: users.passwordHash })
    .from(users)
    .where(inArray(users.email, emails));
  for (const { email, passwordHash } of found) {
    if (await checkPassword(passwordHash, DEMO_PASSWORD)) {
      throw new Error(
        `${email} can sign in with the demo password, which is published. Use a database without the demo teams, or set DEMO_MODE=1 to run the demo.`,
      );
    }
  }
}
