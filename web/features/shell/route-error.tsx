import { useRouteError } from "react-router-dom";
import { problemOf } from "../../lib/api";
import { ProblemMessage } from "../../ui/problem-message";

/** What is shown when a page breaks or can't be fetched: the way back is to load it again. */
export function RouteError() {
  const error = useRouteError();
  return (
    <main className="page pt-10">
      <ProblemMessage problem={problemOf(error)} onRetry={() => window.location.reload()} />
    </main>
  );
}
