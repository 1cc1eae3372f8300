import { HttpResponse, http } from "msw";
import { setupServer } from "msw/node";
import { afterAll, afterEach, beforeAll } from "vitest";
import type { Role } from "#shared/permissions";
import type { Me } from "#shared/schemas/identity";

export const API = "*/api/v1";

/** The API as a test plays it; a request that nobody expected fails the test. */
export const server = setupServer();

/** Starts the played API around each test of a file. */
export function playServer(): void {
  beforeAll(() => server.listen({ onUnhandledRequest: "error" }));
  afterEach(() => server.resetHandlers());
  afterAll(() => server.close());
}

export function buildMe(roles: Role[] = ["designer"]): Me {
  return {
    user: { id: "u1", email: "someone@team.example", name: "S. Omeone" },
    team: { id: 1, name: "The Team", roles },
    teams: [{ id: 1, name: "The Team" }],
  };
}

/** Somebody is signed in with these roles. */
export function signedInAs(...roles: Role[]): void {
  server.use(http.get(`${API}/auth/me`, () => HttpResponse.json(buildMe(roles))));
}
