import { circuitOf } from "#shared/bias/circuits/registry";
import { assuredSwing, boxOf } from "#shared/bias/spread";
import { figureSignal, figureStage, negativeRail } from "#shared/bias/stage-sheet";
import { cautionsFor } from "#shared/cautions";
import type { Brief } from "#shared/schemas/brief";
import type { Fit, FitsRequest, FitsResponse } from "#shared/schemas/fits";
import type { Part } from "#shared/schemas/part";
import { costOfBuild } from "./cost";
import { unitPriceAt } from "./filters";
import type { ResistorSupply } from "./problem";
import { type RankingControl, rankParts } from "./rank-parts";
import { describePassedOver } from "./reasons";
import { findRelaxation } from "./relax";
import { resistorsOfCandidate } from "./search/create-search";
import type { Candidate } from "./search/order";

/** How long a search may take unless told otherwise, ms. */
const TIME_LIMIT_MS = 60_000;
/** How many fits are shown while a search goes on, and how often. */
const FIRST_ROWS = 25;
const MS_BETWEEN_SHOWINGS = 250;

/**
 * Answers a request for fits: the exact ranking, dressed with every fit's figures and cautions; where nothing fits,
 * what to relax.
 *
 * @param parts the parts the team may use
 * @param supply what resistors can be bought
 * @param onFits told the first rows now and then; they may still change
 * @throws the signal's reason when called off
 */
export async function rankFits(
  request: FitsRequest,
  parts: readonly Part[],
  supply: ResistorSupply,
  { onFits, ...control }: Partial<RankingControl> & { onFits?: (fits: Fit[]) => void } = {},
): Promise<FitsResponse> {
  const started = performance.now();
  const present = (candidates: Candidate[], among: readonly Part[]) =>
    candidates.map((candidate) => presentFit(among[candidate.row], request.brief, supply, candidate));
  let shownAt = started;
  const timed = {
    ...control,
    deadline: control.deadline ?? Date.now() + TIME_LIMIT_MS,
    onCandidates: (candidates: Candidate[], among: readonly Part[]) => {
      if (!onFits || performance.now() - shownAt < MS_BETWEEN_SHOWINGS) return;
      onFits(present(candidates.slice(0, FIRST_ROWS), among));
      shownAt = performance.now();
    },
  };
  const ranking = await rankParts(request, parts, supply, timed);
  const relax =
    ranking.candidates.length === 0 && ranking.complete
      ? await findRelaxation(request, parts, supply, timed)
      : null;
  return {
    fits: present(ranking.candidates, ranking.parts),
    considered: ranking.considered,
    partsThatFit: ranking.partsThatFit,
    complete: ranking.complete,
    ...(ranking.complete ? {} : { remainingBound: remainingBound(request) }),
    passedOver: describePassedOver(ranking.passedOver, request.brief),
    relax,
    elapsedMs: performance.now() - started,
  };
}

/**
 * The best that a part which was not searched may still hold: dead centre; half of what falls across the stage, as no
 * a.c. line is longer than that each way; or nothing to pay.
 */
function remainingBound({ brief, objective }: FitsRequest): number {
  return objective === "assured" ? (brief.rail.volts + negativeRail(brief)) / 2 : 0;
}

function presentFit(part: Part, brief: Brief, supply: ResistorSupply, candidate: Candidate): Fit {
  const resistors = resistorsOfCandidate(brief.circuit, candidate);
  const figures = figureStage(part, brief, resistors);
  const volts = circuitOf(brief.circuit).resistorVoltages(figures.values, figures.bias.id);
  return {
    part: {
      id: part.id,
      partNumber: part.partNumber,
      maker: part.maker,
      polarity: part.polarity,
      package: part.package,
      mounting: part.mounting,
      lifecycle: part.lifecycle,
      stock: part.stock,
      unitPrice: unitPriceAt(part, brief.buildQuantity),
    },
    ...resistors,
    bias: figures.bias,
    supplyCurrent: figures.supplyCurrent,
    ...figureSignal(part, brief, figures),
    assured: assuredSwing(boxOf(part, brief, figures.values)).swing,
    cost: costOfBuild(part, brief, supply.prices, resistors, volts)?.cents ?? null,
    cautions: cautionsFor(part, brief, resistors),
  };
}
