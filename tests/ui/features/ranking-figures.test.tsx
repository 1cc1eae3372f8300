import { screen, waitFor, within } from "@testing-library/react";
import { HttpResponse, http } from "msw";
import { describe, expect, it } from "vitest";
import type { Fit } from "#shared/schemas/fits";
import type { FitYieldsRequest } from "#shared/schemas/yield";
import { NewBriefPage } from "../../../web/features/briefs/new-brief-page";
import { buildAnswer, buildFit, fill, playRanking, playYields } from "../support/briefs";
import { renderAt } from "../support/render";
import { API, playServer, server, signedInAs } from "../support/server";

playServer();

const PAGES = { "/briefs/new": <NewBriefPage /> };

const manyFits = (count: number) =>
  Array.from({ length: count }, (_, index) => buildFit(index + 1, `AAA-${index + 1}`, 4 - 0.01 * index));

/** What a part's row says under a column's head. */
async function cellOf(partNumber: string, head: string): Promise<HTMLElement> {
  const table = await screen.findByRole("treegrid", { name: "Ranked fits" });
  const heads = within(table).getAllByRole("columnheader");
  const column = heads.findIndex((cell) => cell.textContent?.replace(", sort", "") === head);
  const row = screen.getByText(partNumber).closest("tr");
  return row?.children[column] as HTMLElement;
}

describe("what comes first", () => {
  it("is chosen above the table, asked for, and kept in the address, with a way back", async () => {
    signedInAs("designer");
    const asked = playRanking(buildAnswer());
    const { user, router } = renderAt("/briefs/new?b={}&sort=gain", PAGES);
    await user.click(await screen.findByRole("radio", { name: "Most assured swing" }));
    await waitFor(() => expect(asked.at(-1)?.objective).toBe("assured"));
    expect(router.state.location.search).toContain("by=assured");
    // The list comes in the order that was chosen.
    expect(router.state.location.search).not.toContain("sort=");
    await user.click(screen.getByRole("radio", { name: "Least cost" }));
    await waitFor(() => expect(asked.at(-1)?.objective).toBe("cost"));
    expect(asked.map(({ objective }) => objective)).toEqual(["centred", "assured", "cost"]);
    void router.navigate(-1);
    await waitFor(() =>
      expect(screen.getByRole("radio", { name: "Most assured swing" }).getAttribute("aria-checked")).toBe(
        "true",
      ),
    );
    // That ranking is there already.
    expect(asked.length).toBe(3);
  });

  it("comes from a link, and holds for a part's other sets too", async () => {
    signedInAs("designer");
    const asked = playRanking(buildAnswer(), buildAnswer({ fits: [buildFit(1, "AAA-1", 3.9)] }));
    const { user } = renderAt("/briefs/new?b={}&by=cost", PAGES);
    const table = await screen.findByRole("treegrid", { name: "Ranked fits" });
    within(table).getAllByRole("row")[1].focus();
    await user.keyboard("{ArrowRight}");
    await screen.findByRole("grid", { name: "Resistor sets of AAA-1" });
    expect(asked.map(({ objective, distinct }) => `${objective} ${distinct}`)).toEqual([
      "cost part",
      "cost none",
    ]);
  });

  it("says what least cost leaves out, and only then", async () => {
    signedInAs("designer");
    playRanking(buildAnswer());
    const { user } = renderAt("/briefs/new?b={}", PAGES);
    await screen.findByText("AAA-1");
    const words = "Only fits whose assured swing is at least 1 V.";
    expect(screen.queryByText(words)).toBeNull();
    await user.click(screen.getByRole("radio", { name: "Least cost" }));
    expect(await screen.findByText(words)).toBeTruthy();
  });

  it("can be changed while it ranks, without losing the focus", async () => {
    signedInAs("designer");
    server.use(http.post(`${API}/fits`, () => new Promise<Response>(() => {})));
    const { user } = renderAt("/briefs/new?b={}", PAGES);
    const choice = await screen.findByRole("radio", { name: "Most assured swing" });
    await user.click(choice);
    await waitFor(() => expect(choice.getAttribute("aria-checked")).toBe("true"));
    expect(document.activeElement).toBe(choice);
  });
});

describe("a fit's row", () => {
  const withFit = (changed: Partial<Fit>) => {
    signedInAs("designer");
    playRanking(buildAnswer({ fits: [{ ...buildFit(1, "AAA-1", 4), ...changed }] }));
    return renderAt("/briefs/new?b={}", PAGES);
  };

  it("shows the swing that every build has, in figures and in the balance bar", async () => {
    withFit({ assured: { towardCutoff: 2.5, towardOhmic: 2.1, symmetric: 2.1 } });
    expect((await cellOf("AAA-1", "assured swing")).textContent).toBe("2.10 V");
    expect(screen.getByRole("img", { name: /Every build has 2\.10 V and 2\.50 V\.$/ })).toBeTruthy();
  });

  it("says of no assured swing what it means", async () => {
    withFit({ assured: { towardCutoff: 0, towardOhmic: 2.1, symmetric: 0 } });
    const cell = await cellOf("AAA-1", "assured swing");
    expect(cell.textContent).toBe("0 V, some builds leave saturation");
    expect(within(cell).getByTitle("some builds leave saturation")).toBeTruthy();
  });

  it("shows the cost of the whole build and of one stage", async () => {
    // 100 builds unless told otherwise.
    withFit({ cost: 2430 });
    expect((await cellOf("AAA-1", "cost of 100")).textContent).toBe("$24.30$0.24 each");
  });

  it("keeps a tenth of a cent where a stage costs less than ten", async () => {
    withFit({ cost: 434 });
    expect((await cellOf("AAA-1", "cost of 100")).textContent).toBe("$4.34$0.043 each");
  });

  it("says so where a price is missing", async () => {
    withFit({ cost: null });
    expect((await cellOf("AAA-1", "cost of 100")).textContent).toBe("—, a price is missing");
  });
});

describe("the yield of the rows on show", () => {
  it("is asked for in groups, in the order of the table, and says its interval", async () => {
    signedInAs("designer");
    playRanking(buildAnswer({ fits: manyFits(25) }));
    const asked = playYields({ fraction: 0.973, low: 0.9697, high: 0.976 });
    renderAt("/briefs/new?b={}", PAGES);
    await waitFor(async () => expect((await cellOf("AAA-25", "yield")).textContent).toMatch(/^97\.3 %/));
    expect(asked.map(({ fits }) => fits.map(({ partId }) => partId))).toEqual([
      [1, 2, 3, 4, 5, 6, 7, 8, 9, 10],
      [11, 12, 13, 14, 15, 16, 17, 18, 19, 20],
      [21, 22, 23, 24, 25],
    ]);
    expect(asked[0]).toMatchObject({ builds: 10_000, seed: 1, brief: { rail: { volts: 12 } } });
    expect(asked[0].fits[0].resistors).toEqual({ r1: 1.8e6, r2: 750e3, rg: 0, rd: 2700, rs: 1200, rs2: 0 });
    const words = "95 % interval 97.0 % to 97.6 %, from 10,000 builds";
    const cell = await cellOf("AAA-1", "yield");
    expect(within(cell).getByTitle(words).textContent).toBe(`97.3 %, ${words}`);
  });

  it("follows the order that the table is sorted in", async () => {
    signedInAs("designer");
    playRanking(buildAnswer({ fits: manyFits(12) }));
    const asked = playYields();
    // By swing upward, which the parts' numbers go against.
    renderAt("/briefs/new?b={}&sort=swing", PAGES);
    await waitFor(() => expect(asked.length).toBe(2));
    expect(asked[0].fits[0].partId).toBe(12);
    expect(asked[1].fits.map(({ partId }) => partId)).toEqual([2, 1]);
  });

  it("is a dash while it is waited for, and is called off with its brief", async () => {
    signedInAs("designer");
    playRanking(buildAnswer({ fits: manyFits(25) }));
    const asked: FitYieldsRequest[] = [];
    let closed = 0;
    server.use(
      http.post(`${API}/fits/yield`, async ({ request }) => {
        asked.push((await request.json()) as FitYieldsRequest);
        request.signal.addEventListener("abort", () => {
          closed += 1;
        });
        return new Promise<Response>(() => {});
      }),
    );
    const { user } = renderAt("/briefs/new?b={}", PAGES);
    expect((await cellOf("AAA-1", "yield")).textContent).toBe("—, not worked out yet");
    await waitFor(() => expect(asked.length).toBe(1));
    const later = playYields();
    await fill(user, "Swing", "2 V");
    await user.click(screen.getByRole("button", { name: "Rank the fits" }));
    await waitFor(() => expect(closed).toBe(1));
    await waitFor(() => expect(later.length).toBe(3));
    expect(later.map(({ brief }) => brief.swing.peak)).toEqual([2, 2, 2]);
  });

  it("that can't be had says so in its place, and the fits stay", async () => {
    signedInAs("designer");
    playRanking(buildAnswer());
    server.use(http.post(`${API}/fits/yield`, () => HttpResponse.json({}, { status: 500 })));
    renderAt("/briefs/new?b={}", PAGES);
    await waitFor(async () =>
      expect((await cellOf("AAA-1", "yield")).textContent).toBe("—, The answer can't be read"),
    );
    expect(screen.getByText("BBB-2")).toBeTruthy();
  });
});

describe("the first rows", () => {
  it("stand there before the ranking ends, marked as provisional, with no yield asked for", async () => {
    signedInAs("designer");
    const yields = playYields();
    let send = (_line: object) => {};
    server.use(
      http.post(`${API}/fits`, () => {
        const body = new ReadableStream({
          start(controller) {
            send = (line) => {
              controller.enqueue(new TextEncoder().encode(`${JSON.stringify(line)}\n`));
              if ("result" in line) controller.close();
            };
          },
        });
        return new HttpResponse(body, { headers: { "content-type": "application/x-ndjson" } });
      }),
    );
    renderAt("/briefs/new?b={}", PAGES);
    await screen.findByText("Ranking");
    send({ progress: { partsDone: 12, partsTotal: 1260 } });
    send({ hint: "a kind of line that this page doesn't know" });
    send({ fits: [buildFit(9, "EARLY-9", 3)] });
    expect(await screen.findByText("EARLY-9")).toBeTruthy();
    expect(screen.getByText("Provisional, still ranking: these rows may change.")).toBeTruthy();
    expect(screen.getByText("Ranking: 12 of 1,260 parts")).toBeTruthy();
    expect(yields).toEqual([]);
    send({ result: buildAnswer() });
    expect(await screen.findByText("AAA-1")).toBeTruthy();
    expect(screen.queryByText("EARLY-9")).toBeNull();
    expect(screen.queryByText(/^Provisional/)).toBeNull();
    await waitFor(() => expect(yields.length).toBe(1));
  });
});
