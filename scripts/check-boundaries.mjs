import { checkBoundaries } from "./lib/boundaries.mjs";
import { runScript } from "./lib/lifetime.mjs";
import { root } from "./lib/paths.mjs";

await runScript(
  async () => {
    const { modules, violations } = await checkBoundaries(root);
    for (const { law, sentence } of violations) console.error(`${law}: ${sentence}`);
    console.log(`${modules} modules read, ${violations.length} boundaries broken.`);
    return violations.length === 0 ? 0 : 1;
  },
  { interrupted: 130 },
);
