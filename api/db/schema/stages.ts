import { index, int, json, mysqlTable, text, varchar } from "drizzle-orm/mysql-core";
import type { Brief } from "#shared/schemas/brief";
import type { Resistors } from "#shared/schemas/circuit";
import type { Part } from "#shared/schemas/part";
import { briefs } from "./briefs";
import { key, keyOf, moment } from "./columns";
import { users } from "./identity";
import { teams } from "./teams";

/** Kept fits: part and brief frozen as they were. A deleted one keeps its row, so that deleting can be undone. */
export const stages = mysqlTable(
  "stages",
  {
    id: key(),
    teamId: keyOf("team_id")
      .notNull()
      .references(() => teams.id, { onDelete: "cascade" }),
    name: varchar("name", { length: 120 }).notNull(),
    note: text("note").notNull(),
    version: int("version", { unsigned: true }).notNull(),
    part: json("part").$type<Part>().notNull(),
    resistors: json("resistors").$type<Resistors>().notNull(),
    brief: json("brief").$type<Brief>().notNull(),
    briefId: keyOf("brief_id").references(() => briefs.id, { onDelete: "set null" }),
    briefName: varchar("brief_name", { length: 120 }),
    briefVersion: int("brief_version", { unsigned: true }),
    createdBy: varchar("created_by", { length: 255 })
      .notNull()
      .references(() => users.id),
    updatedBy: varchar("updated_by", { length: 255 })
      .notNull()
      .references(() => users.id),
    createdAt: moment("created_at").notNull(),
    updatedAt: moment("updated_at").notNull(),
    deletedAt: moment("deleted_at"),
  },
  (table) => [index("stages_by_team").on(table.teamId, table.updatedAt)],
);
