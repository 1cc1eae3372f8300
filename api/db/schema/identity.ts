import { mysqlTable, varchar } from "drizzle-orm/mysql-core";
import { moment } from "./columns";

export const users = mysqlTable("users", {
  id: varchar("id", { length: 255 }).primaryKey(),
  /** Lower case, so that one address is one account. */
  email: varchar("email", { length: 254 }).notNull().unique(),
  name: varchar("name", { length: 120 }).notNull(),
  passwordHash: varchar("password_hash", { length: 255 }).notNull(),
  createdAt: moment("created_at").notNull(),
});
