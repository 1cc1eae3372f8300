import { z } from "zod";
import { ROLES } from "#shared/permissions";

export const signInSchema = z.strictObject({
  email: z.email("Write an e-mail address").max(254),
  password: z.string().min(1, "Write your password").max(1024),
});

export const switchTeamSchema = z.strictObject({ teamId: z.int().positive() });

const team = z.object({ id: z.int().positive(), name: z.string() });

/** Who is signed in, for which team, with which roles. */
export const meSchema = z.object({
  user: z.object({ id: z.string(), email: z.string(), name: z.string() }),
  team: team.extend({ roles: z.array(z.enum(ROLES)) }),
  teams: z.array(team),
});

export type SignIn = z.infer<typeof signInSchema>;
export type SwitchTeam = z.infer<typeof switchTeamSchema>;
export type Me = z.infer<typeof meSchema>;

/** The accounts of the demo, while it runs. */
export const demoAccountsSchema = z.object({
  password: z.string(),
  accounts: z.array(z.object({ email: z.string(), role: z.enum(ROLES), team: z.string() })),
});

export type DemoAccounts = z.infer<typeof demoAccountsSchema>;
