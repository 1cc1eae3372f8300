import { readFileSync, writeFileSync } from "node:fs";
import { createServer } from "node:http";
import type { AddressInfo } from "node:net";
import { join } from "node:path";
import { expect, onTestFinished, test } from "vitest";
import { anyFreePort } from "../../scripts/lib/ports.mjs";
import { startServer } from "../../scripts/lib/server.mjs";
import { temporaryFolder } from "./snippet";

async function start(source: string, port?: number) {
  const folder = temporaryFolder();
  const program = join(folder, "server.mjs");
  const log = join(folder, "server.log");
  writeFileSync(program, source);
  const chosen = port ?? (await anyFreePort());
  const server = await startServer({ port: chosen, env: process.env, keptIn: folder, log, program });
  onTestFinished(server.stop);
  return { port: chosen, log };
}

const WELL = `
  import { createServer } from "node:http";
  console.log("a line for the log");
  createServer((request, response) => response.writeHead(request.url === "/healthz" ? 200 : 404).end())
    .listen(process.env.PORT, "127.0.0.1");
`;

test("waits for a server that says it is well, and keeps its log", async () => {
  const { port, log } = await start(WELL);
  expect((await fetch(`http://127.0.0.1:${port}/healthz`)).status).toBe(200);
  expect(readFileSync(log, "utf8")).toBe("a line for the log\n");
});

test("waits while the server says it is not well yet", async () => {
  const { port } = await start(`
    import { createServer } from "node:http";
    let asked = 0;
    createServer((request, response) => response.writeHead(++asked < 4 ? 503 : 200).end(String(asked)))
      .listen(process.env.PORT, "127.0.0.1");
  `);
  expect(await (await fetch(`http://127.0.0.1:${port}/healthz`)).text()).toBe("5");
});

test("tells at once, with its last lines, that the server ended", async () => {
  await expect(start(`console.error("SESSION_SECRET is missing"); process.exit(1);`)).rejects.toThrow(
    /^The server ended instead of starting\.[\s\S]*SESSION_SECRET is missing$/,
  );
});

test("another program's answer on the same port does not pass for the server's", async () => {
  const other = createServer((_, response) => response.writeHead(200).end("another"));
  await new Promise<void>((resolve) => other.listen(0, "127.0.0.1", resolve));
  onTestFinished(() => void other.close());
  const { port } = other.address() as AddressInfo;
  await expect(start(WELL, port)).rejects.toThrow(/The server ended instead of starting[\s\S]*EADDRINUSE/);
});
