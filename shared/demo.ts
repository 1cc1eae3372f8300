import { ROLES, type Role } from "./permissions";

/** Published on purpose; a server outside demo mode refuses to start while it opens an account. */
export const DEMO_PASSWORD = "evenswing-demo";

export const DEMO_TEAMS = [
  { name: "Tidewater Acoustics", domain: "tidewater.example" },
  { name: "Lantern Audio Works", domain: "lantern.example" },
] as const;

/** One account a role in each demo team. */
export const DEMO_ACCOUNTS: readonly { email: string; role: Role; team: string }[] = DEMO_TEAMS.flatMap(
  ({ name, domain }) => ROLES.map((role) => ({ email: `${role}@${domain}`, role, team: name })),
);
