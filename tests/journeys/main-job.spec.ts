import { expect, type Page, test } from "@playwright/test";
import { fillBlank, signIn } from "./support/people";

/** Writes the brief of the main job and ranks it. */
async function rankTheBrief(page: Page): Promise<void> {
  await page.getByRole("link", { name: "Write a brief" }).click();
  await fillBlank(page, "Rail", "12");
  await fillBlank(page, "Rail tolerance", "5 %");
  await fillBlank(page, "Load", "10k");
  await fillBlank(page, "Swing", "1 V");
  await page.getByRole("combobox", { name: "Resistor series" }).selectOption("E24");
  await page.getByRole("button", { name: "Rank the fits" }).click();
  await expect(page.getByText(/combinations ranked in/)).toBeVisible();
}

const firstFit = (page: Page) => page.getByRole("treegrid", { name: "Ranked fits" }).getByRole("row").nth(1);
const qLabel = (page: Page) => page.locator("figure").getByText(/^Q \d/).first();

test("a brief in, ranked fits out, a stage kept", async ({ page, browser }) => {
  await signIn(page, "designer@tidewater.example");
  await rankTheBrief(page);

  await test.step("the best fit is centred and swings at least 1 V", async () => {
    const cells = await firstFit(page).getByRole("gridcell").allInnerTexts();
    const percent = cells.find((text) => text.endsWith("%"));
    expect(Number(percent?.replace(" %", ""))).toBeLessThan(1);
  });

  await test.step("the address holds the brief and its ranking", async () => {
    await page.reload();
    await expect(page.getByText(/combinations ranked in/)).toBeVisible();
    await expect(page.getByRole("textbox", { name: "Load", exact: true })).toHaveValue("10 kΩ");
  });

  await firstFit(page).press("Enter");
  await expect(page).toHaveURL(/\/stages\/new\?/);

  const name = `Journey stage ${Date.now()}`;
  await test.step("stepping R2 up one value moves the Q-point", async () => {
    const before = await qLabel(page).textContent();
    const r2 = page.getByRole("group", { name: "R2" });
    const valueBefore = await r2.getByRole("status").textContent();
    await r2.getByRole("button", { name: /^R2 higher/ }).click();
    await expect(r2.getByRole("status")).not.toHaveText(valueBefore ?? "");
    await expect(qLabel(page)).not.toHaveText(before ?? "");
  });
  const steppedTo = await page.getByRole("group", { name: "R2" }).getByRole("status").textContent();

  await test.step("keeping it makes a stage of its own that survives a reload", async () => {
    await page.getByRole("button", { name: "Keep this stage" }).click();
    const dialog = page.getByRole("dialog");
    await dialog.getByLabel("Name").fill(name);
    await dialog.getByRole("button", { name: /^Keep/ }).click();
    await expect(page).toHaveURL(/\/stages\/\d+$/);
    await page.reload();
    await expect(page.getByRole("heading", { name })).toBeVisible();
    await expect(page.getByRole("group", { name: "R2" }).getByRole("status")).toHaveText(steppedTo ?? "");
  });
  const address = new URL(page.url()).pathname;

  await test.step("a viewer of the team can look and step, and can't keep, rename or delete", async () => {
    const viewer = await (await browser.newContext()).newPage();
    await signIn(viewer, "viewer@tidewater.example");
    await viewer.goto(address);
    await expect(viewer.getByRole("heading", { name })).toBeVisible();
    await expect(viewer.getByRole("button", { name: /keep|rename|delete/i })).toHaveCount(0);
    await viewer
      .getByRole("group", { name: "R2" })
      .getByRole("button", { name: /^R2 lower/ })
      .click();
    await expect(viewer.getByRole("button", { name: /keep/i })).toHaveCount(0);
    const refused = await viewer.request.delete(`/api/v1${address}`);
    expect(refused.status()).toBe(403);
  });

  await test.step("the other team sees none of it", async () => {
    const stranger = await (await browser.newContext()).newPage();
    await signIn(stranger, "owner@lantern.example");
    await stranger.goto(address);
    await expect(stranger.getByText("Not found")).toBeVisible();
    await stranger.goto("/stages");
    await expect(stranger.getByRole("heading", { name: "Stages" })).toBeVisible();
    await expect(stranger.getByText(name)).toHaveCount(0);
    expect((await stranger.request.get(`/api/v1${address}`)).status()).toBe(404);
  });

  await test.step("deleting it can be undone", async () => {
    await page.getByRole("button", { name: /delete/i }).click();
    await expect(page).toHaveURL(/\/stages$/);
    await page.getByRole("button", { name: "Undo" }).click();
    await expect(page.getByText(name)).toBeVisible();
  });
});

test("a brief that nothing fits says what to relax, and the relaxed brief fits", async ({ page }) => {
  await signIn(page, "designer@tidewater.example");
  await page.getByRole("link", { name: "Write a brief" }).click();
  await fillBlank(page, "Rail", "5 V");
  await fillBlank(page, "Swing", "4.5 V");
  await page.getByRole("button", { name: "Rank the fits" }).click();
  await expect(page.getByText("Nothing fits this brief.")).toBeVisible();
  await expect(page.getByText(/Lower the swing from 4.5 V to/)).toBeVisible();
  await page.getByRole("button", { name: "Relax it and rank again" }).click();
  await expect(page.getByText(/[1-9][\d,]* parts? fits?/)).toBeVisible();
});

test("a brief is saved, changed, saved again, and found in the list", async ({ page }) => {
  const name = `Journey brief ${Date.now()}`;
  await signIn(page, "designer@tidewater.example");
  await page.getByRole("link", { name: "Write a brief" }).click();
  await page.getByRole("button", { name: "Save this brief" }).click();
  const dialog = page.getByRole("dialog");
  await dialog.getByRole("button", { name: "Save" }).click();
  await expect(dialog.getByText("Give the brief a name")).toBeVisible();
  await dialog.getByLabel("Name").fill(name);
  await dialog.getByRole("button", { name: "Save" }).click();
  await expect(page).toHaveURL(/\/briefs\/\d+$/);
  await expect(page.getByText("version 1 · saved")).toBeVisible();

  await fillBlank(page, "Swing", "2 V");
  await expect(page.getByText("version 1 · changes not saved")).toBeVisible();
  await page.getByRole("button", { name: "Save version 2" }).click();
  await expect(page.getByText("version 2 · saved")).toBeVisible();
  await page.getByRole("link", { name: "Briefs", exact: true }).click();
  await expect(page.getByRole("row", { name: new RegExp(name) })).toContainText("2 V peak");
});

test("values that can't be read are named under the sentence, and nothing is ranked", async ({ page }) => {
  await signIn(page, "designer@tidewater.example");
  await page.getByRole("link", { name: "Write a brief" }).click();
  await fillBlank(page, "Rail", "600 V");
  await expect(page.getByText("Rail: Rails go from 0.5 V to 450 V")).toBeVisible();
  await fillBlank(page, "Rail", "3 mA");
  await expect(page.getByText(/^Rail: /)).toBeVisible();
  await page.getByRole("button", { name: "Rank the fits" }).click();
  await expect(page.getByText(/combinations ranked in/)).toHaveCount(0);
});
