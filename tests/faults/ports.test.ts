import { createServer, type Server } from "node:net";
import { expect, onTestFinished, test } from "vitest";
import { freePortFrom, readPort } from "../../scripts/lib/ports.mjs";

function listen(port: number): Promise<Server> {
  return new Promise((resolve, reject) => {
    const server = createServer();
    server.once("error", reject);
    server.listen({ port, host: "127.0.0.1" }, () => resolve(server));
    onTestFinished(() => void server.close());
  });
}

function portOf(server: Server): number {
  return (server.address() as { port: number }).port;
}

test("takes the next free port where the wished one is taken", async () => {
  const taken = portOf(await listen(0));
  const free = await freePortFrom(taken);
  expect(free).toBeGreaterThan(taken);
  expect(portOf(await listen(free))).toBe(free);
});

test("takes the wished port where it is free", async () => {
  const server = await listen(0);
  const port = portOf(server);
  await new Promise((resolve) => server.close(resolve));
  expect(await freePortFrom(port)).toBe(port);
});

test.each(["0", "65536", "80a", "8080.5", "-1", "http"])("refuses PORT=%s in words", (text) => {
  expect(() => readPort(text, 8080)).toThrow(`whole number from 1 to 65535; it's "${text}"`);
});

test("an empty PORT means the usual one", () => {
  expect(readPort("", 8080)).toBe(8080);
  expect(readPort(undefined, 8080)).toBe(8080);
  expect(readPort("9000", 8080)).toBe(9000);
});
