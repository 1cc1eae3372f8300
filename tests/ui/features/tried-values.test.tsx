import { screen, within } from "@testing-library/react";
import { HttpResponse, http } from "msw";
import { describe, expect, it } from "vitest";
import { briefSchema } from "#shared/schemas/brief";
import type { Stage, UpdateStage } from "#shared/schemas/stage";
import { StagePage } from "../../../web/features/stages/stage-page";
import { buildPart } from "../../support/build-part";
import { renderAt } from "../support/render";
import { API, playServer, server, signedInAs } from "../support/server";

playServer();

const someone = { id: "u1", name: "S. Omeone" };
const STAGE: Stage = {
  id: 4,
  name: "First stage",
  note: "",
  version: 3,
  part: buildPart(),
  resistors: { r1: 1.8e6, r2: 750e3, rd: 2700, rs: 1200 },
  brief: briefSchema.parse({ rail: { volts: 12 }, load: { ohms: 10e3 } }),
  origin: null,
  createdBy: someone,
  updatedBy: someone,
  createdAt: "2026-11-02T09:00:00.000Z",
  updatedAt: "2026-11-03T09:00:00.000Z",
};

function openAt(search: string) {
  server.use(
    http.get(`${API}/stages/4`, () => HttpResponse.json(STAGE)),
    http.put(`${API}/stages/4`, async ({ request }) => {
      const change = (await request.json()) as UpdateStage;
      return HttpResponse.json({ ...STAGE, ...change, version: change.version + 1 });
    }),
  );
  return renderAt(`/stages/4${search}`, { "/stages/:id": <StagePage /> });
}

async function valueShown(name: string) {
  const group = await screen.findByRole("group", { name });
  return within(group).getByRole("status").textContent;
}

describe("values tried on a kept stage", () => {
  it("stand in the address, and only what differs from the kept ones", async () => {
    signedInAs("viewer");
    const { user, router } = openAt("");
    const r2 = await screen.findByRole("group", { name: "R2" });
    await user.click(within(r2).getByRole("button", { name: /^R2 higher/ }));
    expect(router.state.location.search).toBe("?r2=820000");
    await user.click(within(r2).getByRole("button", { name: /^R2 lower/ }));
    expect(router.state.location.search).toBe("");
  });

  it("are there again for whoever opens that address", async () => {
    signedInAs("viewer");
    openAt("?r2=820000");
    expect(await valueShown("R2")).toBe("820k");
    expect(await valueShown("R1")).toBe("1M8");
    expect(screen.getByText(/R2 750k → 820k/)).toBeTruthy();
  });

  it("leave the address once they are kept", async () => {
    signedInAs("designer");
    const { user, router } = openAt("?r2=820000");
    await user.click(await screen.findByRole("button", { name: "Keep these values" }));
    expect(await screen.findByText("Kept the new values.")).toBeTruthy();
    expect(router.state.location.search).toBe("");
    expect(await valueShown("R2")).toBe("820k");
  });

  it.each(["?r2=many", "?r2=-5", "?r2=1e12", "?rs=0"])("are not read from %s", async (search) => {
    signedInAs("viewer");
    openAt(search);
    expect(await valueShown("R2")).toBe("750k");
    expect(await valueShown("RS")).toBe("1k2");
  });
});
