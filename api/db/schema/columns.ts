import { datetime, int } from "drizzle-orm/mysql-core";

/** An auto-incremented key. */
export const key = () => int("id", { unsigned: true }).autoincrement().primaryKey();

/** A reference to such a key. */
export const keyOf = (name: string) => int(name, { unsigned: true });

/** A moment in UTC, to the millisecond. */
export const moment = (name: string) => datetime(name, { mode: "date", fsp: 3 });
