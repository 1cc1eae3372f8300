import { expect, test } from "vitest";
import { DEMO_ACCOUNTS, DEMO_PASSWORD, DEMO_TEAMS } from "#shared/demo";
import { describeDemo } from "../../scripts/lib/demo.mjs";

test("what npm start says about signing in is what the demo has", () => {
  const said = describeDemo();
  expect(said).toContain(`password ${DEMO_PASSWORD} `);
  expect(said.match(/\S+@\S+/g)?.sort()).toEqual(DEMO_ACCOUNTS.map(({ email }) => email).sort());
  for (const { name } of DEMO_TEAMS) expect(said).toContain(`  ${name}\n`);
});
