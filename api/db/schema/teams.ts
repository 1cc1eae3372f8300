import { foreignKey, mysqlEnum, mysqlTable, primaryKey, varchar } from "drizzle-orm/mysql-core";
import { ROLES } from "#shared/permissions";
import { key, keyOf, moment } from "./columns";
import { users } from "./identity";

export const teams = mysqlTable("teams", {
  id: key(),
  name: varchar("name", { length: 120 }).notNull(),
  createdAt: moment("created_at").notNull(),
});

export const memberships = mysqlTable(
  "memberships",
  {
    teamId: keyOf("team_id")
      .notNull()
      .references(() => teams.id, { onDelete: "cascade" }),
    userId: varchar("user_id", { length: 255 })
      .notNull()
      .references(() => users.id, { onDelete: "cascade" }),
    createdAt: moment("created_at").notNull(),
  },
  (table) => [primaryKey({ columns: [table.teamId, table.userId] })],
);

/** A member has one role or more. */
export const membershipRoles = mysqlTable(
  "membership_roles",
  {
    teamId: keyOf("team_id").notNull(),
    userId: varchar("user_id", { length: 255 }).notNull(),
    role: mysqlEnum("role", ROLES).notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.teamId, table.userId, table.role] }),
    foreignKey({
      name: "membership_roles_of_membership",
      columns: [table.teamId, table.userId],
      foreignColumns: [memberships.teamId, memberships.userId],
    }).onDelete("cascade"),
  ],
);
