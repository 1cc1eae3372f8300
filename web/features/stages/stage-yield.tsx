import { keepPreviousData, useQuery } from "@tanstack/react-query";
import { useEffect, useState } from "react";
import { Link } from "react-router-dom";
import type { Brief } from "#shared/schemas/brief";
import type { Resistors } from "#shared/schemas/circuit";
import type { BuildParameter, StageYieldResponse } from "#shared/schemas/yield";
import { formatCount, formatPercent } from "#shared/values/engineering";
import { problemOf } from "../../lib/api";
import { Button } from "../../ui/button";
import { Fact, Facts } from "../../ui/facts";
import { YIELD_BUILDS, yieldQuery } from "./queries";

type StageYieldProps = {
  /** The kept stage; null for a fit that isn't kept. */
  stageId: number | null;
  partId: number;
  brief: Brief;
  resistors: Resistors;
};

/** Stepping on within this time asks for one yield and not for each, ms. */
const SETTLING_MS = 400;

/** The share of simulated builds that meet the brief, and what costs the most of them. */
export function StageYield({ stageId, partId, brief, resistors }: StageYieldProps) {
  const settled = useSettled(resistors);
  const { data, error, isPlaceholderData, refetch, isFetching } = useQuery({
    ...yieldQuery({ stageId, partId, brief, resistors: settled }),
    placeholderData: keepPreviousData,
  });
  const isStale = isPlaceholderData || settled !== resistors;
  const label = (
    <Link to="/method#yield" className="hover:text-ink hover:underline hover:underline-offset-3">
      Yield, {formatCount(YIELD_BUILDS)} builds
    </Link>
  );
  if (error) {
    return (
      <Facts>
        <Fact label={label} note={`${problemOf(error).title}.`}>
          <Button variant="link" size="small" busy={isFetching} onClick={() => refetch()}>
            try again
          </Button>
        </Fact>
      </Facts>
    );
  }
  if (!data) {
    return (
      <Facts>
        <Fact label={label}>being simulated…</Fact>
      </Facts>
    );
  }
  return (
    <div className={isStale ? "text-quiet" : undefined} aria-busy={isStale}>
      <Facts>
        <Fact label={label} note={intervalInWords(data)}>
          {formatPercent(data.yield.fraction)}
          {isStale && <span className="block font-sans text-xs">before the last step</span>}
        </Fact>
      </Facts>
      <p className="pt-1.5 text-sm">{lossInWords(data)}</p>
    </div>
  );
}

function intervalInWords({ yield: { fraction, low, high } }: StageYieldResponse): string {
  // Near the ends the interval is narrower than a tenth of a per cent.
  const decimals = Math.min(fraction, 1 - fraction) < NEAR_AN_END ? 2 : 1;
  return `95 % interval ${formatPercent(low, decimals)} to ${formatPercent(high, decimals)}`;
}

const NEAR_AN_END = 0.005;

const PARAMETERS: Record<BuildParameter, { name: string; held: string }> = {
  vt: { name: "the threshold", held: "its typical value" },
  k: { name: "the conduction parameter", held: "its typical value" },
  rail: { name: "the rail", held: "its nominal voltage" },
  resistors: { name: "the resistors", held: "their nominal values" },
  ambient: { name: "the ambient temperature", held: "room temperature" },
};

function lossInWords({ costliest, yield: { fraction } }: StageYieldResponse): string | null {
  if (!costliest) return null;
  const { name, held } = PARAMETERS[costliest.parameter];
  // Where even that leaves most of the loss, no one parameter is to blame for most of it.
  const isMost = costliest.fraction - fraction > 0.5 * (1 - fraction);
  const share = isMost ? "Most of the loss comes from" : "The largest part of the loss comes from";
  return `${share} ${name}: held at ${held}, ${formatPercent(costliest.fraction)} would pass.`;
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
