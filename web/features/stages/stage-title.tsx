import type { ReactNode } from "react";
import { Link } from "react-router-dom";
import type { Part } from "#shared/schemas/part";
import type { Stage } from "#shared/schemas/stage";
import { PageTitle } from "../../ui/page-title";

type StageTitleProps = { name: string; part: Part; origin: Stage["origin"]; actions?: ReactNode };

/** A sheet's title line: name, part, and where it came from. */
export function StageTitle({ name, part, origin, actions }: StageTitleProps) {
  return (
    <PageTitle
      size="small"
      aside={
        <>
          {part.partNumber} · {part.maker} · {part.package}
          {origin && (
            <>
              {" "}
              · from{" "}
              <Link to={`/briefs/${origin.briefId}`} className="underline underline-offset-3 hover:text-ink">
                {origin.briefName}
              </Link>{" "}
              version {origin.briefVersion}
            </>
          )}
        </>
      }
      actions={actions}
    >
      {name}
    </PageTitle>
  );
}
