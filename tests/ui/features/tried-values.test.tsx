import { screen, within } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import { renderAt } from "../support/render";
import { playServer, signedInAs } from "../support/server";
import { PAGES, playStage } from "../support/stages";

playServer();

/** A kept stage with R2 at 750 kΩ, opened at an address. */
function openAt(search: string) {
  playStage();
  return renderAt(`/stages/4${search}`, PAGES);
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
