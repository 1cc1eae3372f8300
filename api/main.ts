import { createServer } from "node:http";
import pino from "pino";
import { createApp } from "./app";
import { openDatabase } from "./db/client";
import { readEnvironment } from "./env";
import { refuseDemoSecrets } from "./features/identity/demo";
import { Backoff } from "./http/backoff";
import { createSessions } from "./http/session";
import { closePool, startPool } from "./ranking/pool";
import { closeSimulation } from "./simulation/pool";

const HOST = "127.0.0.1";
const WEB_FOLDER = "dist/web";

const environment = readEnvironment();
const log = pino({ level: environment.logLevel });
const { db, close } = openDatabase(environment.databaseUrl);
const clock = () => new Date();

if (environment.production && !environment.demo) await refuseDemoSecrets(db);

const app = createApp(
  {
    db,
    environment,
    clock,
    sessions: createSessions(db, environment, clock),
    signInBackoff: new Backoff(),
    log,
  },
  environment.production ? WEB_FOLDER : undefined,
);
startPool();
const server = createServer(app);
server.listen(environment.port, HOST, () => log.info(`listening on http://${HOST}:${environment.port}`));

/** Finishes what is under way, then lets go of everything; a second signal ends at once. */
async function shutDown() {
  process.once("SIGINT", () => process.exit(1));
  process.once("SIGTERM", () => process.exit(1));
  server.close();
  server.closeIdleConnections();
  const patience = setTimeout(() => server.closeAllConnections(), 3000);
  await new Promise((done) => server.once("close", done));
  clearTimeout(patience);
  await Promise.all([closePool(), closeSimulation()]);
  await close();
}
process.once("SIGINT", shutDown);
process.once("SIGTERM", shutDown);
