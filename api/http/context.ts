import type { Logger } from "pino";
import type { Database } from "../db/client";
import type { Environment } from "../env";
import type { Backoff } from "./backoff";
import type { Actor, Sessions } from "./session";

/** What stays the same from request to request. */
export type Surroundings = {
  db: Database;
  environment: Environment;
  clock: () => Date;
  sessions: Sessions;
  signInBackoff: Backoff;
  log: Logger;
};

/** What every service function is given first. */
export type Context = Surroundings & {
  requestId: string;
  /** The address the request came from, for limits. */
  address: string;
};

/** The context of somebody signed in. */
export type SignedInContext = Context & { actor: Actor };
