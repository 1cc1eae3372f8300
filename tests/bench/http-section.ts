import { readFileSync } from "node:fs";
import { setTimeout as wait } from "node:timers/promises";
import { DEMO_ACCOUNTS, DEMO_PASSWORD } from "#shared/demo";
import type { BriefInput } from "#shared/schemas/brief";
import type { LoopObjective } from "./loops";
import { median, percentile, type Report } from "./report";

const WARM_UP = 20;
const CLIENTS = 8;
const REQUESTS_OF_ONE = 150;
const REQUESTS_OF_EIGHT = 160;
const OVERHEAD_BAR = 1.5;

/** The server to measure: started by the bench's script on a database of its own. */
export type BenchServer = { url: string; pid: number };

type Answer = { ms: number; body: string };

/** Latency and throughput of `POST /fits` over HTTP with the seeded catalog, and the server's memory. */
export async function benchHttp(report: Report, server: BenchServer): Promise<void> {
  const client = await signIn(server.url);
  report.heading("POST /fits over HTTP, seeded catalog, E24, limit 100, every brief another one");
  report.figure("HTTP: memory of the server at rest", megabytes(server.pid, "VmRSS"), "MB");
  for (const objective of ["centred", "assured"] as const) {
    const ask = () => client.fits(objective);
    await client.makeRoom(WARM_UP + REQUESTS_OF_ONE);
    for (let n = 0; n < WARM_UP; n++) await ask();

    const latencies: number[] = [];
    const searches: number[] = [];
    let considered = 0;
    let bytes = 0;
    for (let n = 0; n < REQUESTS_OF_ONE; n++) {
      const { ms, body } = await ask();
      const answer: { elapsedMs: number; considered: number } = JSON.parse(body);
      latencies.push(ms);
      searches.push(answer.elapsedMs);
      considered = answer.considered;
      bytes = Buffer.byteLength(body);
    }
    const overhead = latencies.map((ms, n) => ms / searches[n]);
    const label = `HTTP, ${objective}, 1 client`;
    const p95 = percentile(latencies, 0.95);
    report.figure(`${label}: combinations a request`, considered, "");
    report.figure(`${label}: an answer`, bytes / 1024, "KB");
    report.figure(`${label}: p50`, median(latencies), "ms");
    report.figure(`${label}: p95`, p95, "ms");
    report.figure(`${label}: the search's own time, p50`, median(searches), "ms");
    report.figure(`${label}: the search's own time, p95`, percentile(searches, 0.95), "ms");
    report.figure(
      `${label}: latency over own time of the same request, p95`,
      percentile(overhead, 0.95),
      "times",
    );
    report.figure(`${label}: p95 over p50 of the search's own time`, p95 / median(searches), "times");
    report.bar(
      `${label}: p95 over p95 of the search's own time`,
      p95 / percentile(searches, 0.95),
      OVERHEAD_BAR,
      "below",
    );
    await benchClients(report, client, objective);
  }
  report.figure("HTTP: memory of the server afterwards", megabytes(server.pid, "VmRSS"), "MB");
  report.figure("HTTP: memory of the server at most", megabytes(server.pid, "VmHWM"), "MB");
}

/** Several clients at once, each asking again as soon as it is answered. */
async function benchClients(report: Report, client: Client, objective: LoopObjective): Promise<void> {
  await client.makeRoom(REQUESTS_OF_EIGHT);
  const latencies: number[] = [];
  const started = performance.now();
  const askOften = async () => {
    for (let n = 0; n < REQUESTS_OF_EIGHT / CLIENTS; n++) latencies.push((await client.fits(objective)).ms);
  };
  await Promise.all(Array.from({ length: CLIENTS }, askOften));
  const seconds = (performance.now() - started) / 1000;
  const label = `HTTP, ${objective}, ${CLIENTS} clients`;
  report.figure(`${label}: p50`, median(latencies), "ms");
  report.figure(`${label}: p95`, percentile(latencies, 0.95), "ms");
  report.figure(`${label}: throughput`, latencies.length / seconds, "requests/s");
}

type Client = Awaited<ReturnType<typeof signIn>>;

/**
 * Signs in as a designer of the demo.
 *
 * @throws Error with the server's words when it refuses
 */
async function signIn(url: string) {
  const base = `${url}/api/v1`;
  const account = DEMO_ACCOUNTS.find(({ role }) => role === "designer");
  const headers: Record<string, string> = { "content-type": "application/json" };
  const signedIn = await fetch(`${base}/auth/sign-in`, {
    method: "POST",
    headers,
    body: JSON.stringify({ email: account?.email, password: DEMO_PASSWORD }),
  });
  if (!signedIn.ok) throw new Error(`Signing in failed: ${await signedIn.text()}`);
  headers.cookie = signedIn.headers.getSetCookie()[0].split(";")[0];

  let asked = 0;
  let left = { requests: 0, seconds: 0, readAt: 0 };
  const readLimit = (response: Response) => {
    const [, requests, seconds] = response.headers.get("ratelimit")?.match(/r=(\d+); *t=(\d+)/) ?? [];
    left = { requests: Number(requests), seconds: Number(seconds), readAt: performance.now() };
  };
  readLimit(signedIn);
  return {
    /** Waits, where so many requests would be more than the server takes in a minute, until it takes them. */
    async makeRoom(requests: number): Promise<void> {
      if (left.requests >= requests) return;
      await wait(Math.max(0, (left.seconds + 1) * 1000 - (performance.now() - left.readAt)));
    },
    /** Asks for the fits of a brief nobody has asked before. */
    async fits(objective: LoopObjective): Promise<Answer> {
      const brief: BriefInput = {
        rail: { volts: 12 },
        load: { ohms: 10e3 },
        swing: { peak: 0.5 + ++asked * 1e-5 },
      };
      const body = JSON.stringify({ brief, objective, limit: 100 });
      const started = performance.now();
      const response = await fetch(`${base}/fits`, { method: "POST", headers, body });
      const answer = await response.text();
      const ms = performance.now() - started;
      if (!response.ok) throw new Error(`POST /fits answered ${response.status}: ${answer}`);
      readLimit(response);
      return { ms, body: answer };
    },
  };
}

/** What Linux says of a process's memory: VmRSS now, VmHWM at most. */
function megabytes(pid: number, field: "VmRSS" | "VmHWM"): number {
  const status = readFileSync(`/proc/${pid}/status`, "utf8");
  return Number(status.match(new RegExp(`^${field}:\\s*(\\d+) kB`, "m"))?.[1]) / 1024;
}
