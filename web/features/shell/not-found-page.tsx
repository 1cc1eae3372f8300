import { Link } from "react-router-dom";
import { useDocumentTitle } from "../../lib/use-document-title";
import { Button } from "../../ui/button";
import { EmptyState } from "../../ui/empty-state";

/** An address that leads nowhere. */
export function NotFoundPage() {
  useDocumentTitle("Not found");
  return (
    <>
      <h1 className="sr-only">Not found</h1>
      <EmptyState
        title="There is no page at this address."
        action={
          <Button asChild>
            <Link to="/">Go to the start</Link>
          </Button>
        }
      >
        It may have been moved, or the address was cut short on its way.
      </EmptyState>
    </>
  );
}
