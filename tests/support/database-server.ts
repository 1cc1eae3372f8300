import mysql from "mysql2/promise";

/**
 * The address of a database on the tests' own MariaDB.
 *
 * @param name its name; empty: none in particular
 * @throws {Error} where no such server was started
 */
export function testDatabaseUrl(name: string): string {
  const address = process.env.TEST_DATABASE_URL;
  if (!address) {
    throw new Error(
      "These tests need a MariaDB of their own. Run them with `npm test`, or some of them with " +
        "`npm test -- tests/api/briefs.test.ts`: it starts one and clears it away.",
    );
  }
  const url = new URL(address);
  url.pathname = `/${name}`;
  return url.href;
}

/**
 * Does something with a connection to the tests' MariaDB, and closes it.
 *
 * @param name the database to be in; empty: none
 */
export async function withConnection<T>(
  name: string,
  work: (connection: mysql.Connection) => Promise<T>,
): Promise<T> {
  const connection = await mysql.createConnection({ uri: testDatabaseUrl(name), multipleStatements: true });
  try {
    return await work(connection);
  } finally {
    await connection.end();
  }
}
