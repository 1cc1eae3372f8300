import { keepPreviousData, useQuery } from "@tanstack/react-query";
import { useEffect, useState } from "react";
import { Link } from "react-router-dom";
import type { Brief } from "#shared/schemas/brief";
import type { Resistors } from "#shared/schemas/circuit";
import type { BuildParameter, StageYieldResponse } from "#shared/schemas/yield";
import { formatCount, formatPercent } from "#shared/values/engineering";
import { problemOf } from "../../lib/api";
import { yieldQuery } from "./queries";

type StageYieldProps = {
  /** The kept stage; null for a fit that isn't kept. */
  stageId: number | null;
  partId: number;
  brief: Brief;
  resistors: Resistors;
};

/** Stepping on within this time asks for one yield and not for each, ms. */
const SETTLING_MS = 400;

const PARAMETER_WORDS: Record<BuildParameter, string> = {
  vt: "the threshold",
  k: "the conduction parameter",
  rail: "the rail",
  resistors: "the resistors",
  ambient: "the temperature",
};

/** The share of simulated builds that meet the brief, and what costs the most of them. */
export function StageYield(props: StageYieldProps) {
  const resistors = useSettled(props.resistors);
  const { data, error, isPlaceholderData } = useQuery({
    ...yieldQuery({ ...props, resistors }),
    placeholderData: keepPreviousData,
  });
  const isStale = isPlaceholderData || resistors !== props.resistors;
  return (
    <p aria-live="polite" className={`mt-2 text-sm leading-5.5 ${isStale ? "text-quiet" : ""}`}>
      <Link to="/method#yield" className="hover:underline hover:underline-offset-3">
        Yield
      </Link>{" "}
      {error ? (
        `can't be worked out: ${problemOf(error).title}`
      ) : data ? (
        <Yield answer={data} />
      ) : (
        "is being simulated…"
      )}
      {isStale && data && !error && " (before the last change)"}
    </p>
  );
}

function Yield({ answer }: { answer: StageYieldResponse }) {
  const { fraction, low, high, builds } = answer.yield;
  const { costliest } = answer;
  return (
    <>
      <strong className="value">{formatPercent(fraction)}</strong> of {formatCount(builds)} simulated builds
      meet the brief (95 % interval {formatPercent(low)} to {formatPercent(high)}).
      {costliest &&
        ` ${capitalised(PARAMETER_WORDS[costliest.parameter])} costs the most: held at its typical value, ${formatPercent(costliest.fraction)} would.`}
    </>
  );
}

function capitalised(words: string): string {
  return words[0].toUpperCase() + words.slice(1);
}

/** A value once it has stood still for a moment. */
function useSettled<T>(value: T): T {
  const [settled, setSettled] = useState(value);
  useEffect(() => {
    const timer = setTimeout(() => setSettled(value), SETTLING_MS);
    return () => clearTimeout(timer);
  }, [value]);
  return settled;
}
