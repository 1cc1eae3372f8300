import { expect, test } from "@playwright/test";
import { signIn } from "./support/people";

test("a stage's sheet prints on one page of A4, with its cautions and without its controls", async ({
  page,
}) => {
  await signIn(page, "viewer@tidewater.example");
  await page.goto("/stages/1");
  await expect(page.getByRole("region", { name: "Cautions" })).toBeVisible();
  const pdf = await page.pdf({ format: "A4" });
  expect(pdf.toString("latin1").match(/\/Type\s*\/Page\b/g)).toHaveLength(1);

  await page.emulateMedia({ media: "print" });
  await expect(page.getByRole("region", { name: "Cautions" })).toBeVisible();
  await expect(page.getByRole("button")).toHaveCount(0);
  await expect(page.getByRole("navigation")).toHaveCount(0);
});
