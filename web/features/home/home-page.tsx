import { useQuery } from "@tanstack/react-query";
import type { ReactNode } from "react";
import { Link } from "react-router-dom";
import { problemOf } from "../../lib/api";
import { briefInWords } from "../../lib/brief-words";
import { formatDay } from "../../lib/dates";
import { briefsQuery, stagesQuery } from "../../lib/lists";
import { useMay, useMe } from "../../lib/session";
import { useDocumentTitle } from "../../lib/use-document-title";
import { Button } from "../../ui/button";
import { EmptyState } from "../../ui/empty-state";
import { PageTitle } from "../../ui/page-title";
import { ProblemMessage } from "../../ui/problem-message";
import { SkeletonRows } from "../../ui/skeleton";

const SHOWN = 6;

/** Where one starts: the latest briefs and stages, and the way to a new brief. */
export function HomePage() {
  useDocumentTitle(null);
  const me = useMe();
  const mayWrite = useMay("design:write");
  const briefs = useQuery(briefsQuery);
  const stages = useQuery(stagesQuery);
  const newBrief = (
    <Button asChild variant="main">
      <Link to="/briefs/new">{mayWrite ? "Write a brief" : "Try a brief"}</Link>
    </Button>
  );
  return (
    <>
      <PageTitle actions={newBrief}>{me.team.name}</PageTitle>
      <div className="mt-8 grid gap-x-16 gap-y-12 lg:grid-cols-2">
        <Recent
          title="Latest briefs"
          all="/briefs"
          query={briefs}
          empty={
            <EmptyState title="No brief yet." action={newBrief}>
              A brief says what a stage must do: rail, load, swing. Its ranked fits follow on the same page.
            </EmptyState>
          }
        >
          {(brief) => (
            <Entry
              key={brief.id}
              to={`/briefs/${brief.id}`}
              name={brief.name}
              line={briefInWords(brief.brief)}
              when={`version ${brief.version} · ${formatDay(brief.updatedAt)}`}
            />
          )}
        </Recent>
        <Recent
          title="Latest stages"
          all="/stages"
          query={stages}
          empty={
            <EmptyState title="No stage kept yet.">
              Open a fit from a brief and keep it: its values are frozen here, with its load line.
            </EmptyState>
          }
        >
          {(stage) => (
            <Entry
              key={stage.id}
              to={`/stages/${stage.id}`}
              name={stage.name}
              line={`${stage.part.partNumber}, ${briefInWords(stage.brief)}`}
              when={`${stage.updatedBy.name} · ${formatDay(stage.updatedAt)}`}
            />
          )}
        </Recent>
      </div>
    </>
  );
}

type RecentProps<T> = {
  title: string;
  all: string;
  query: { data?: T[]; error: unknown; isFetching: boolean; refetch: () => unknown };
  empty: ReactNode;
  children: (item: T) => ReactNode;
};

function Recent<T>({ title, all, query, empty, children }: RecentProps<T>) {
  const { data, error, refetch, isFetching } = query;
  return (
    <section>
      <div className="flex items-baseline justify-between border-ink border-b pb-1.5">
        <h2 className="font-medium text-sm">{title}</h2>
        <Link to={all} className="text-quiet text-sm underline underline-offset-3 hover:text-ink">
          all
        </Link>
      </div>
      {error ? (
        <div className="mt-4">
          <ProblemMessage problem={problemOf(error)} onRetry={refetch} retrying={isFetching} />
        </div>
      ) : data === undefined ? (
        <SkeletonRows rows={3} label={title} />
      ) : data.length === 0 ? (
        empty
      ) : (
        <ul>{data.slice(0, SHOWN).map(children)}</ul>
      )}
    </section>
  );
}

function Entry({ to, name, line, when }: { to: string; name: string; line: string; when: string }) {
  return (
    <li className="border-rule border-b">
      <Link
        to={to}
        className="flex flex-wrap items-baseline justify-between gap-x-6 px-1 py-2.5 hover:bg-panel"
      >
        <span>
          <span className="font-semibold">{name}</span>
          <span className="block text-quiet text-sm">{line}</span>
        </span>
        <span className="text-quiet text-sm">{when}</span>
      </Link>
    </li>
  );
}
