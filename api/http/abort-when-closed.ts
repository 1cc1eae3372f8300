import type { Response } from "express";

/** A signal for work that nobody waits for once the connection is gone. */
export function abortWhenClosed(response: Response): AbortSignal {
  const controller = new AbortController();
  const hangUp = () => {
    if (!response.writableFinished) controller.abort();
  };
  // The caller may have gone while the session was looked up, and that is told only once.
  if (response.closed) hangUp();
  else response.once("close", hangUp);
  return controller.signal;
}
