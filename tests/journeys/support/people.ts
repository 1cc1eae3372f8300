import { expect, type Page } from "@playwright/test";

/** Signs in as a demo person through the form, and waits for the first page. */
export async function signIn(page: Page, email: string): Promise<void> {
  await page.goto("/sign-in");
  await page.getByLabel("E-mail").fill(email);
  await page.getByLabel("Password").fill("evenswing-demo");
  await page.getByRole("button", { name: "Sign in", exact: true }).click();
  await expect(page.getByRole("link", { name: "Briefs", exact: true })).toBeVisible();
}

/** Fills one blank of the sentence brief. */
export async function fillBlank(page: Page, label: string, text: string): Promise<void> {
  const blank = page.getByRole("textbox", { name: label, exact: true });
  await blank.fill(text);
  await blank.press("Tab");
}
