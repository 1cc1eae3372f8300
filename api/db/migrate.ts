import { readEnvironment } from "../env";
import { migrateDatabase, openDatabase } from "./client";

const { db, close } = openDatabase(readEnvironment().databaseUrl);
try {
  await migrateDatabase(db);
} finally {
  await close();
}
