import { screen, waitFor, within } from "@testing-library/react";
import fc from "fast-check";
import { HttpResponse, http } from "msw";
import { describe, expect, it } from "vitest";
import { briefSchema } from "#shared/schemas/brief";
import { CIRCUITS, type CircuitName } from "#shared/schemas/circuit";
import { adaptBrief } from "../../../web/features/briefs/adapt-brief";
import { NewBriefPage } from "../../../web/features/briefs/new-brief-page";
import { briefInWords, conditionsInWords } from "../../../web/lib/brief-words";
import { BRIEF, buildAnswer, buildFit, fill, playRanking } from "../support/briefs";
import { renderAt } from "../support/render";
import { API, playServer, server, signedInAs } from "../support/server";

playServer();

const PAGES = { "/briefs/new": <NewBriefPage />, "/stages/new": <p>The sheet</p> };

function openBrief(address = "/briefs/new") {
  signedInAs("designer");
  const asked = playRanking(buildAnswer());
  return { asked, ...renderAt(address, PAGES) };
}

type User = ReturnType<typeof renderAt>["user"];

async function choose(user: User, circuit: CircuitName) {
  await user.selectOptions(await screen.findByRole("combobox", { name: "Circuit" }), circuit);
}

const rank = (user: User) => user.click(screen.getByRole("button", { name: "Rank the fits" }));

const briefOf = (changed: object) => `/briefs/new?b=${encodeURIComponent(JSON.stringify(changed))}`;

describe("the circuit of a brief", () => {
  it("is chosen by its title in the sentence, drawn beside it, and asked for", async () => {
    const { user, asked } = openBrief();
    const choice = await screen.findByRole("combobox", { name: "Circuit" });
    expect(
      within(choice)
        .getAllByRole("option")
        .map((option) => option.textContent),
    ).toEqual([
      "four-resistor common source",
      "common source, split source resistor",
      "source follower",
      "drain feedback",
      "common source, gate at ground",
    ]);
    await choose(user, "follower");
    expect(screen.getByRole("img", { name: "Schematic: Source follower" })).toBeTruthy();
    await rank(user);
    await waitFor(() => expect(asked[0]?.brief.circuit).toBe("follower"));
  });

  it("decides which values and which treatment of the source resistor are asked about", async () => {
    const { user } = openBrief();
    await user.click(await screen.findByRole("button", { name: "more conditions" }));
    const offered = () => ({
      ranges: ["R1 and R2", "R2 and RG", "RG", "RD", "RS", "RS and RS2"].filter((name) =>
        screen.queryByRole("group", { name }),
      ),
      treatments: [
        ...(screen.queryByRole<HTMLSelectElement>("combobox", { name: "Source resistor" })?.options ?? []),
      ].map((option) => option.text),
    });
    const all = ["Bypassed", "Not bypassed", "None"];
    expect(offered()).toEqual({ ranges: ["R1 and R2", "RD", "RS"], treatments: all });
    await choose(user, "split-source");
    expect(offered()).toEqual({ ranges: ["R1 and R2", "RD", "RS and RS2"], treatments: [] });
    await choose(user, "follower");
    expect(offered()).toEqual({ ranges: ["R1 and R2", "RS"], treatments: [] });
    await choose(user, "drain-feedback");
    expect(offered()).toEqual({ ranges: ["R2 and RG", "RD", "RS"], treatments: all });
    await choose(user, "negative-rail");
    expect(offered()).toEqual({ ranges: ["RG", "RD", "RS"], treatments: all.slice(0, 2) });
  });

  it("brings its negative rail along, the same volts unless stated", async () => {
    const { user, asked } = openBrief();
    await choose(user, "negative-rail");
    const negative = await screen.findByRole<HTMLInputElement>("textbox", { name: "Negative rail" });
    expect([negative.value, negative.placeholder]).toEqual(["", "12 V"]);
    await rank(user);
    await waitFor(() => expect(asked[0]?.brief.rail).toEqual({ volts: 12, tolerance: 0.05 }));
    await fill(user, "Negative rail", "5 V");
    await rank(user);
    await waitFor(() => expect(asked[1]?.brief.rail).toEqual({ volts: 12, negative: 5, tolerance: 0.05 }));
  });

  it("takes with it what another circuit doesn't have: its negative rail, written or unreadable", async () => {
    const { user, asked } = openBrief(briefOf({ circuit: "negative-rail", rail: { negative: 5 } }));
    await fill(user, "Negative rail", "some");
    expect(await screen.findByText(/^Negative rail: .*some/)).toBeTruthy();
    await choose(user, "four-resistor");
    expect(screen.queryByText(/^Negative rail/)).toBeNull();
    await rank(user);
    await waitFor(() => expect(asked.at(-1)?.brief.circuit).toBe("four-resistor"));
    expect(asked.at(-1)?.brief.rail).toEqual({ volts: 12, tolerance: 0.05 });
  });

  it("brings a source resistor back where it needs one", async () => {
    const { user, asked } = openBrief(briefOf({ sourceResistor: "none" }));
    expect(await screen.findByText("no RS")).toBeTruthy();
    await choose(user, "follower");
    expect(screen.queryByText("no RS")).toBeNull();
    await rank(user);
    await waitFor(() => expect(asked.at(-1)?.brief.circuit).toBe("follower"));
    expect(asked.at(-1)?.brief.sourceResistor).not.toBe("none");
  });

  it("heads the table's columns with its own resistors, and a sheet's address carries it", async () => {
    const fit = { ...buildFit(1, "AAA-1", 4), r1: 0, r2: 0, rg: 1e6, rd: 2700, rs: 1200 };
    signedInAs("designer");
    playRanking(buildAnswer({ fits: [fit] }));
    // Another circuit's column may be left in the address.
    const address = `${briefOf({ circuit: "drain-feedback" })}&sort=r1`;
    const { user, router } = renderAt(address, PAGES);
    const table = await screen.findByRole("treegrid", { name: "Ranked fits" });
    const heads = within(table)
      .getAllByRole("columnheader")
      .map((head) => head.textContent?.replace(", sort", ""));
    expect(heads.filter((head) => head?.startsWith("R"))).toEqual(["R2", "RG", "RD", "RS"]);
    const row = within(table).getAllByRole("row")[1];
    const cells = [...row.children].map((cell) => cell.textContent);
    const shownUnder = (name: string) => cells[heads.indexOf(name)];
    expect(["R2", "RG", "RD", "RS"].map(shownUnder)).toEqual(["—", "1M", "2k7", "1k2"]);
    row.focus();
    await user.keyboard("{Enter}");
    await screen.findByText("The sheet");
    const search = new URLSearchParams(router.state.location.search);
    expect(JSON.parse(search.get("b") ?? "")).toEqual({ circuit: "drain-feedback" });
    expect(search.get("rg")).toBe("1000000");
  });

  it("that the server refuses is named under the sentence", async () => {
    signedInAs("designer");
    const problem = {
      type: "about:blank",
      title: "The brief can't be ranked",
      status: 422,
      code: "invalid",
      errors: [{ path: "brief.rail.negative", message: "Out of reach" }],
    };
    server.use(http.post(`${API}/fits`, () => HttpResponse.json(problem, { status: 422 })));
    renderAt(briefOf({ circuit: "negative-rail", rail: { negative: 5 } }), PAGES);
    expect(await screen.findByText("Negative rail: Out of reach")).toBeTruthy();
    expect(screen.getByRole("textbox", { name: "Negative rail" }).getAttribute("aria-invalid")).toBe("true");
  });
});

describe("a brief taken to another circuit", () => {
  const circuit = fc.constantFrom(...CIRCUITS);
  const ohms = fc.constantFrom(10, 1e3, 1e5);
  const range = fc.record({ series: fc.constantFrom("E12", "E96"), min: ohms, max: ohms });

  it("is one that the server takes, whatever it was before", () => {
    fc.assert(
      fc.property(
        circuit,
        circuit,
        fc.constantFrom("bypassed", "unbypassed", "none"),
        fc.option(fc.integer({ min: 1, max: 400 }), { nil: undefined }),
        (from, to, sourceResistor, negative) => {
          const before = briefSchema.safeParse({
            circuit: from,
            rail: { volts: 12, negative },
            sourceResistor,
          });
          fc.pre(before.success);
          if (!before.success) return;
          const after = adaptBrief(before.data, to);
          expect(after.circuit).toBe(to);
          expect(briefSchema.safeParse(after).success).toBe(true);
        },
      ),
    );
  });

  it("keeps its values, but for a range that is upside down and out of sight", () => {
    fc.assert(
      fc.property(range, (drain) => {
        const before = { ...BRIEF, resistors: { ...BRIEF.resistors, drain: drain as never } };
        const after = adaptBrief(before, "follower").resistors;
        expect(after.drain.min).toBeLessThanOrEqual(after.drain.max);
        expect(after.drain.series).toBe(drain.series);
        if (drain.min <= drain.max) expect(after).toEqual(before.resistors);
        expect(adaptBrief(before, "drain-feedback").resistors).toEqual(before.resistors);
      }),
    );
  });
});

describe("a brief in words", () => {
  const brief = (changed: object) => briefSchema.parse({ rail: { volts: 12 }, ...changed });

  it("names a circuit other than the four-resistor stage, and both rails", () => {
    expect(briefInWords(brief({}))).toBe("12 V ± 5 %, no load");
    expect(briefInWords(brief({ circuit: "follower" }))).toBe("source follower, 12 V ± 5 %, no load");
    const rails = { volts: 12, negative: 5 };
    expect(briefInWords(brief({ circuit: "negative-rail", rail: rails }))).toBe(
      "common source, gate at ground, 12 V and −5 V ± 5 %, no load",
    );
  });

  it("says nothing of a treatment that the circuit leaves no choice of", () => {
    expect(conditionsInWords(brief({ sourceResistor: "unbypassed" }))).toContain("RS not bypassed");
    const follower = brief({ circuit: "follower", sourceResistor: "unbypassed" });
    expect(conditionsInWords(follower)).not.toContain("RS not bypassed");
  });

  it("names the resistors that a least drop is across", () => {
    const drop = { sourceDrop: { min: 1 } };
    expect(conditionsInWords(brief(drop))).toContain("at least 1 V across RS");
    expect(conditionsInWords(brief({ ...drop, circuit: "split-source" }))).toContain(
      "at least 1 V across RS and RS2",
    );
  });
});
