import { chmodSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { expect, test } from "vitest";
import { runSnippet, temporaryFolder } from "./snippet";

/** Runs the installer where ngspice is missing and apt-get is a script of the test's. */
async function install({ aptGet, dpkg = "", uid = 0 }: { aptGet: string; dpkg?: string; uid?: number }) {
  const folder = temporaryFolder();
  const calls = join(folder, "calls");
  for (const [name, body] of Object.entries({ "apt-get": aptGet, dpkg })) {
    const file = join(folder, name);
    writeFileSync(file, `#!/bin/sh\ncd ${folder}\necho "${name} $*" >> calls\n${body}\n`);
    chmodSync(file, 0o755);
  }
  writeFileSync(calls, "");
  const script = runSnippet(`
    process.env.PATH = ${JSON.stringify(folder)};
    process.getuid = () => ${uid};
    const { installMissing } = await lib("apt.mjs");
    await installMissing(["ngspice"]).then(
      (packages) => console.log("installed:", packages.join(" ")),
      (error) => console.log(error.message),
    );
  `);
  const { lines } = await script.ended;
  return { said: lines.join("\n"), calls: readFileSync(calls, "utf8").trim().split("\n") };
}

const INSTALL = "apt-get -o DPkg::Lock::Timeout=120 install -y --no-install-recommends ngspice";
const WORKS = "echo '#!/bin/sh' > ngspice; /bin/chmod +x ngspice";

test("installs what is missing", async () => {
  const { said, calls } = await install({ aptGet: WORKS });
  expect(said).toBe("installed: ngspice");
  expect(calls).toEqual(["dpkg --audit", INSTALL]);
});

test("reads the package lists anew where the first try fails", async () => {
  const { said, calls } = await install({
    aptGet: `case "$1" in update) : > lists;; *) [ -e lists ] || exit 100; ${WORKS};; esac`,
  });
  expect(said).toBe("installed: ngspice");
  expect(calls).toEqual(["dpkg --audit", INSTALL, "apt-get update", INSTALL]);
});

test("sets up first what a killed install left half-done", async () => {
  const { said, calls } = await install({
    aptGet: WORKS,
    dpkg: `[ "$1" = --audit ] && echo "The following packages are only half configured"; exit 0`,
  });
  expect(said).toBe("installed: ngspice");
  expect(calls).toEqual(["dpkg --audit", "dpkg --configure -a", INSTALL]);
});

test("says in apt-get's words why it can't", async () => {
  const aptGet = `[ "$1" = update ] && exit 0; echo "E: Unable to locate package ngspice" >&2; exit 100`;
  const { said } = await install({ aptGet });
  expect(said).toBe(
    "apt-get could not install ngspice. It said last:\n    E: Unable to locate package ngspice",
  );
});

test("without root it says which command to run, and runs none", async () => {
  const { said, calls } = await install({ aptGet: WORKS, uid: 1000 });
  expect(said).toContain('Installing needs root: run "sudo apt-get install --no-install-recommends ngspice"');
  expect(calls).toEqual([""]);
});
