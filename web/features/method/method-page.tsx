import "@fontsource-variable/instrument-sans/wght-italic.css";
import { type ReactNode, useEffect } from "react";
import { useLocation } from "react-router-dom";
import { useDocumentTitle } from "../../lib/use-document-title";
import { MarginNote } from "../../ui/margin-note";
import { PageTitle } from "../../ui/page-title";
import { Formula, WithFormulas } from "./formula";
import type { MethodEntry, MethodSection } from "./section";
import { CAUTIONS } from "./sections/cautions";
import { CIRCUITS } from "./sections/circuits";
import { DEVICE } from "./sections/device";
import { Q_POINT } from "./sections/q-point";
import { ASSUMPTIONS, RANKING, VALUES } from "./sections/ranking";
import { FREQUENCY, RATINGS } from "./sections/ratings";
import { SIGNAL } from "./sections/signal";
import { SPREAD } from "./sections/spread";
import { SWING } from "./sections/swing";
import { WHY } from "./sections/why";

const SECTIONS: readonly MethodSection[] = [
  DEVICE,
  Q_POINT,
  SWING,
  SPREAD,
  WHY,
  SIGNAL,
  FREQUENCY,
  RATINGS,
  CIRCUITS,
];

/** What follows the formulas. */
const CLOSING = [
  { id: "ranking", title: "Ranking" },
  { id: "values", title: "Preferred values" },
  { id: "assumptions", title: "Assumptions and limits" },
  { id: "cautions", title: "Cautions" },
] as const;

/** Every formula that the product uses, with its source, its assumptions and where it stops holding. */
export function MethodPage() {
  useDocumentTitle("Method");
  useFocusOnTarget();
  return (
    <>
      <PageTitle>Method</PageTitle>
      <p className="mt-2 max-w-[42rem] text-quiet">
        Every formula behind a figure, with its source and its limits. The server's ranking and the sheet in
        your browser run the same code.
      </p>
      <div className="mt-8 grid gap-x-16 gap-y-8 grid-cols-[minmax(0,1fr)] lg:grid-cols-[13rem_minmax(0,1fr)] print:block">
        <Contents />
        <div className="flex flex-col gap-14">
          {SECTIONS.map((section) => (
            <Chapter key={section.id} id={section.id} title={section.title}>
              <Words>{section.opening}</Words>
              {section.entries.map((entry) => (
                <Entry key={entry.id} entry={entry} />
              ))}
            </Chapter>
          ))}
          <Chapter {...CLOSING[0]}>
            {RANKING.map((words) => (
              <Words key={words}>{words}</Words>
            ))}
          </Chapter>
          <Chapter {...CLOSING[1]}>
            {VALUES.map((words) => (
              <Words key={words}>{words}</Words>
            ))}
          </Chapter>
          <Chapter {...CLOSING[2]}>
            <ul className="flex max-w-[42rem] list-disc flex-col gap-1.5 pl-5">
              {ASSUMPTIONS.map((words) => (
                <li key={words}>{words}</li>
              ))}
            </ul>
          </Chapter>
          <Chapter {...CLOSING[3]}>
            <Words>
              A caution is computed from the stage, says the stage's own figure, stands on its sheet and can't
              be hidden.
            </Words>
            <dl className="max-w-[42rem] border-ink border-t">
              {Object.entries(CAUTIONS).map(([code, { title, when }]) => (
                <div
                  key={code}
                  id={`caution-${code}`}
                  className="grid gap-x-6 border-rule border-b py-2.5 sm:grid-cols-[11rem_minmax(0,1fr)]"
                >
                  <dt className="font-medium">{title}</dt>
                  <dd>{when}</dd>
                </div>
              ))}
            </dl>
          </Chapter>
        </div>
      </div>
    </>
  );
}

function Contents() {
  return (
    <nav
      aria-label="Contents"
      className="self-start text-sm lg:sticky lg:top-6 lg:max-h-[calc(100dvh-3rem)] lg:overflow-y-auto"
    >
      <ol className="flex flex-col gap-y-3 border-rule border-t pt-3">
        {SECTIONS.map(({ id, title, entries }) => (
          <li key={id}>
            <ContentsLink id={id}>{title}</ContentsLink>
            <ol className="hidden flex-col text-quiet lg:flex">
              {entries.map((entry) => (
                <li key={entry.id}>
                  <ContentsLink id={entry.id}>{entry.title}</ContentsLink>
                </li>
              ))}
            </ol>
          </li>
        ))}
        {CLOSING.map(({ id, title }) => (
          <li key={id}>
            <ContentsLink id={id}>{title}</ContentsLink>
          </li>
        ))}
      </ol>
    </nav>
  );
}

function ContentsLink({ id, children }: { id: string; children: string }) {
  return (
    <a href={`#${id}`} className="block py-0.5 underline-offset-3 hover:text-ink hover:underline">
      {children}
    </a>
  );
}

function Chapter({ id, title, children }: { id: string; title: string; children: ReactNode }) {
  return (
    <section
      id={id}
      tabIndex={-1}
      aria-labelledby={`${id}-title`}
      className="flex scroll-mt-4 flex-col gap-5 outline-none"
    >
      <h2 id={`${id}-title`} className="border-ink border-b pb-1.5 text-xl">
        {title}
      </h2>
      {children}
    </section>
  );
}

function Entry({ entry }: { entry: MethodEntry }) {
  const { id, title, formulas, words, source, limits } = entry;
  return (
    <article
      id={id}
      tabIndex={-1}
      aria-labelledby={`${id}-title`}
      data-keep-together=""
      className="-mx-3 grid scroll-mt-4 gap-x-10 gap-y-3 rounded-sm px-3 py-2 outline-none focus:bg-panel xl:grid-cols-[minmax(0,42rem)_minmax(0,1fr)]"
    >
      <div>
        <h3 id={`${id}-title`} className="text-lg">
          {title}
        </h3>
        {formulas.length > 0 && (
          <div className="my-2.5 flex flex-col gap-2.5 py-1 pl-5 text-lg">
            {formulas.map((formula) => (
              <Formula key={formula} source={formula} className="leading-loose" />
            ))}
          </div>
        )}
        <Words>{words}</Words>
      </div>
      <div className="flex max-w-[42rem] flex-col gap-3 text-quiet xl:pt-1">
        <MarginNote lead="Source.">
          <WithFormulas>{source}</WithFormulas>
        </MarginNote>
        {limits && (
          <MarginNote lead="Limits.">
            <WithFormulas>{limits}</WithFormulas>
          </MarginNote>
        )}
      </div>
    </article>
  );
}

function Words({ children }: { children: string }) {
  return (
    <p className="max-w-[42rem]">
      <WithFormulas>{children}</WithFormulas>
    </p>
  );
}

/** Puts the focus where the address points, so that the keyboard and a screen reader go on from there. */
function useFocusOnTarget() {
  const { hash } = useLocation();
  useEffect(() => {
    if (hash) document.getElementById(decodeURIComponent(hash.slice(1)))?.focus({ preventScroll: true });
  }, [hash]);
}
