import { useQuery } from "@tanstack/react-query";
import { useMemo } from "react";
import { useParams, useSearchParams } from "react-router-dom";
import type { SavedBrief } from "#shared/schemas/brief";
import { problemOf } from "../../lib/api";
import { readBriefParameter } from "../../lib/brief-link";
import { useDocumentTitle } from "../../lib/use-document-title";
import { ProblemMessage } from "../../ui/problem-message";
import { SkeletonRows } from "../../ui/skeleton";
import { BriefWorkbench } from "./brief-workbench";
import { briefQuery } from "./queries";
import { SavedBriefTitle } from "./saved-brief-title";

/** A saved brief and its fits. */
export function BriefPage() {
  const id = Number(useParams().id);
  const { data, error, refetch, isFetching } = useQuery(briefQuery(id));
  useDocumentTitle(data?.name ?? "Brief");
  if (error) return <ProblemMessage problem={problemOf(error)} onRetry={refetch} retrying={isFetching} />;
  if (!data) return <SkeletonRows rows={5} label="The brief is being fetched" />;
  return <SavedBriefWorkbench key={`${data.id} ${data.version}`} saved={data} />;
}

function SavedBriefWorkbench({ saved }: { saved: SavedBrief }) {
  const [search] = useSearchParams();
  const parameter = search.get("b");
  const linked = useMemo(() => (parameter ? readBriefParameter(parameter) : null), [parameter]);
  const brief = linked ?? saved.brief;
  return (
    <BriefWorkbench
      brief={brief}
      ranked={brief}
      briefId={saved.id}
      title={({ brief: current, validate }) => (
        <SavedBriefTitle saved={saved} current={current} validate={validate} />
      )}
    />
  );
}
