import { useEffect } from "react";

/** Names the page in the browser's tab and history. */
export function useDocumentTitle(title: string | null): void {
  useEffect(() => {
    document.title = title ? `${title} · Evenswing` : "Evenswing";
  }, [title]);
}
