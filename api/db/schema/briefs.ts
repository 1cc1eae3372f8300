import { index, int, json, mysqlTable, primaryKey, varchar } from "drizzle-orm/mysql-core";
import type { Brief } from "#shared/schemas/brief";
import { key, keyOf, moment } from "./columns";
import { users } from "./identity";
import { teams } from "./teams";

const person = (name: string) =>
  varchar(name, { length: 255 })
    .notNull()
    .references(() => users.id);

/** Saved briefs as they are now. A deleted one keeps its row, so that deleting can be undone. */
export const briefs = mysqlTable(
  "briefs",
  {
    id: key(),
    teamId: keyOf("team_id")
      .notNull()
      .references(() => teams.id, { onDelete: "cascade" }),
    name: varchar("name", { length: 120 }).notNull(),
    version: int("version", { unsigned: true }).notNull(),
    brief: json("brief").$type<Brief>().notNull(),
    createdBy: person("created_by"),
    updatedBy: person("updated_by"),
    createdAt: moment("created_at").notNull(),
    updatedAt: moment("updated_at").notNull(),
    deletedAt: moment("deleted_at"),
  },
  (table) => [index("briefs_by_team").on(table.teamId, table.updatedAt)],
);

/** Every version that a brief has had; stages point at these. */
export const briefVersions = mysqlTable(
  "brief_versions",
  {
    briefId: keyOf("brief_id")
      .notNull()
      .references(() => briefs.id, { onDelete: "cascade" }),
    version: int("version", { unsigned: true }).notNull(),
    name: varchar("name", { length: 120 }).notNull(),
    brief: json("brief").$type<Brief>().notNull(),
    savedBy: person("saved_by"),
    savedAt: moment("saved_at").notNull(),
  },
  (table) => [primaryKey({ columns: [table.briefId, table.version] })],
);
