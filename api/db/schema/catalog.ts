import { int, mysqlTable } from "drizzle-orm/mysql-core";
import { keyOf } from "./columns";

/**
 * How often what a team can choose from has changed: team 0 stands for the catalog that all share. What is kept in
 * memory is good for one version.
 */
export const catalogVersions = mysqlTable("catalog_versions", {
  teamId: keyOf("team_id").primaryKey(),
  version: int("version", { unsigned: true }).notNull(),
});
