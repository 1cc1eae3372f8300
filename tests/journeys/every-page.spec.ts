import AxeBuilder from "@axe-core/playwright";
import { expect, test } from "@playwright/test";
import { signIn } from "./support/people";

const PAGES = [
  { path: "/", ready: "Latest briefs" },
  { path: "/briefs", ready: "Hydrophone first stage" },
  { path: "/briefs/new", ready: "Rank the fits" },
  { path: "/briefs/1", ready: "combinations ranked in" },
  { path: "/stages", ready: "Line driver output" },
  { path: "/stages/1", ready: "Hydrophone first stage, board A" },
  { path: "/method", ready: "Centring error" },
  { path: "/nowhere", ready: "There is no page at this address." },
] as const;

// Eight pages under an accessibility engine: minutes, when the machine is busy.
test.describe.configure({ timeout: 240_000 });

const VIEWS = [
  { width: 1440, scheme: "light", audited: true },
  { width: 1440, scheme: "dark", audited: false },
  { width: 390, scheme: "light", audited: false },
  { width: 360, scheme: "dark", audited: true },
] as const;

for (const { width, scheme, audited } of VIEWS) {
  test(`every page ${audited ? "is accessible and " : ""}fits ${width} px, ${scheme}`, async ({
    browser,
  }) => {
    const context = await browser.newContext({ viewport: { width, height: 900 }, colorScheme: scheme });
    const page = await context.newPage();
    const complaints: string[] = [];
    // The content policy speaks through the console, and so does React; being signed out or lost is no fault here.
    page.on("console", (message) => {
      if (message.type() === "error" && !/status of 40[14]/.test(message.text()))
        complaints.push(message.text());
    });
    page.on("pageerror", (error) => complaints.push(String(error)));
    await signIn(page, "designer@tidewater.example");
    for (const { path, ready } of PAGES) {
      await page.goto(path);
      await expect(page.getByText(ready).filter({ visible: true }).first()).toBeVisible();
      const overflow = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
      expect(overflow, `${path} is wider than the window`).toBeLessThanOrEqual(0);
      if (!audited) continue;
      const { violations } = await new AxeBuilder({ page })
        .withTags(["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa"])
        .analyze();
      expect(violations.map(({ id, nodes }) => `${path} ${id}: ${nodes[0]?.html}`)).toEqual([]);
    }
    expect(complaints).toEqual([]);
    await context.close();
  });
}

test("signing in returns to the page asked for, and never to another site", async ({ page }) => {
  await page.goto("/stages?x=1");
  await expect(page).toHaveURL(/\/sign-in\?to=/);
  await page.getByLabel("E-mail").fill("viewer@tidewater.example");
  await page.getByLabel("Password").fill("evenswing-demo");
  await page.getByRole("button", { name: "Sign in", exact: true }).click();
  await expect(page).toHaveURL(/\/stages\?x=1$/);

  await page.context().clearCookies();
  await page.goto(`/sign-in?to=${encodeURIComponent("//elsewhere.example/")}`);
  await page.getByLabel("E-mail").fill("viewer@tidewater.example");
  await page.getByLabel("Password").fill("evenswing-demo");
  await page.getByRole("button", { name: "Sign in", exact: true }).click();
  await expect(page.getByText("Latest briefs")).toBeVisible();
  expect(new URL(page.url()).pathname).toBe("/");
});

test("the main job can be done by keyboard alone", async ({ page }) => {
  await signIn(page, "designer@tidewater.example");
  await page.goto("/briefs/1");
  await expect(page.getByText(/combinations ranked in/)).toBeVisible();
  const rows = page.getByRole("treegrid", { name: "Ranked fits" }).getByRole("row");
  await rows.nth(1).focus();
  await page.keyboard.press("ArrowDown");
  await expect(rows.nth(2)).toBeFocused();
  await page.keyboard.press("ArrowRight");
  await expect(page.getByRole("grid", { name: /^Resistor sets of/ })).toBeVisible();
  await page.keyboard.press("ArrowLeft");
  await page.keyboard.press("Enter");
  await expect(page).toHaveURL(/\/stages\/new\?/);
});
