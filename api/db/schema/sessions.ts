import { mysqlTable, varchar } from "drizzle-orm/mysql-core";
import { keyOf, moment } from "./columns";
import { users } from "./identity";
import { teams } from "./teams";

export const sessions = mysqlTable("sessions", {
  id: varchar("id", { length: 255 }).primaryKey(),
  userId: varchar("user_id", { length: 255 })
    .notNull()
    .references(() => users.id, { onDelete: "cascade" }),
  /** The end of the idle time; put off with use. */
  expiresAt: moment("expires_at").notNull(),
  /** The team that this session acts for. */
  teamId: keyOf("team_id")
    .notNull()
    .references(() => teams.id, { onDelete: "cascade" }),
  /** When the person signed in: the absolute time-out counts from here. */
  signedInAt: moment("signed_in_at").notNull(),
});
