import supertest from "supertest";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { routes } from "../../api/app";
import { BASE, startTestApi, type TestApi } from "../support/api";

type Json = Record<string, unknown>;
type Parameter = { name: string; in: string; required?: boolean; schema?: Json };
type Operation = {
  summary?: string;
  security?: Json[];
  parameters?: Parameter[];
  requestBody?: { content: Record<string, { schema: Json }> };
  responses: Record<string, { description: string; content?: Record<string, { schema: Json }> }>;
};
type OpenApi = Json & { paths: Record<string, Record<string, Operation>>; components: Json };

let api: TestApi;
let document: OpenApi;

beforeAll(async () => {
  api = await startTestApi();
  document = (await supertest(api.app).get(`${BASE}/openapi.json`).expect(200)).body;
});
afterAll(() => api.stop());

const operationOf = ({ path, method }: { path: string; method: string }) =>
  document.paths[path.replace(/:(\w+)/g, "{$1}")]?.[method];

/** Every object in a JSON value, with the path to it. */
function* objects(value: unknown, path = "#"): Generator<[string, Json]> {
  if (typeof value !== "object" || value === null) return;
  if (!Array.isArray(value)) yield [path, value as Json];
  for (const [key, inner] of Object.entries(value)) yield* objects(inner, `${path}/${key}`);
}

/** The JSON Schema draft 2020-12 keywords whose shape differs from OpenAPI 3.0's, or is often got wrong. */
function schemaFaults(schema: Json, path: string): string[] {
  const faults: string[] = [];
  const types = ["string", "number", "integer", "boolean", "object", "array", "null"];
  const isNumber = (value: unknown) => typeof value === "number" && Number.isFinite(value);
  const check = (right: boolean, what: string) => {
    if (!right) faults.push(`${path}: ${what}`);
  };
  check(!("nullable" in schema), "nullable is of OpenAPI 3.0");
  if ("type" in schema) {
    for (const type of [schema.type].flat()) check(types.includes(String(type)), `type ${type}`);
  }
  for (const limit of [
    "minimum",
    "maximum",
    "exclusiveMinimum",
    "exclusiveMaximum",
    "minLength",
    "maxLength",
  ]) {
    if (limit in schema) check(isNumber(schema[limit]), `${limit} is no number`);
  }
  if ("required" in schema) {
    const known = Object.keys((schema.properties ?? {}) as Json);
    for (const name of schema.required as string[]) check(known.includes(name), `requires unknown ${name}`);
  }
  for (const list of ["enum", "anyOf", "oneOf", "allOf"]) {
    if (list in schema) check(Array.isArray(schema[list]) && schema[list].length > 0, `${list} is no list`);
  }
  if ([schema.type].flat().includes("array")) check("items" in schema || "prefixItems" in schema, "no items");
  if ("pattern" in schema) check(Boolean(new RegExp(String(schema.pattern))), "pattern");
  return faults;
}

describe("the OpenAPI document", () => {
  it("has every route and nothing else", () => {
    const described = Object.entries(document.paths).flatMap(([path, operations]) =>
      Object.keys(operations).map((method) => `${method} ${path}`),
    );
    const declared = routes.map(({ method, path }) => `${method} ${path.replace(/:(\w+)/g, "{$1}")}`);
    expect(described.sort()).toEqual(declared.sort());
  });

  it.each(routes.map((route) => ({ ...route, name: `${route.method} ${route.path}` })))(
    "says what $name takes, gives and needs",
    (route) => {
      const operation = operationOf(route);
      expect(operation.summary).toBe(route.summary);
      const inPath = (operation.parameters ?? []).filter((parameter) => parameter.in === "path");
      expect(inPath.map(({ name }) => name)).toEqual(
        [...route.path.matchAll(/:(\w+)/g)].map(([, name]) => name),
      );
      for (const parameter of inPath) expect(parameter.required).toBe(true);
      expect("requestBody" in operation).toBe(route.body !== undefined);
      const success = route.response ? String(route.status ?? 200) : "204";
      expect(operation.responses[success]?.description).toBeTruthy();
      expect("content" in operation.responses[success]).toBe(route.response !== undefined);
      expect("401" in operation.responses).toBe(route.access !== "public");
      expect(operation.security).toEqual(route.access === "public" ? [] : [{ session: [] }]);
    },
  );

  it("refers to nothing that isn't there", () => {
    for (const [path, object] of objects(document)) {
      if (typeof object.$ref !== "string") continue;
      expect(object.$ref, path).toMatch(/^#\//);
      const steps = object.$ref.slice(2).split("/");
      const found = steps.reduce<unknown>((value, step) => (value as Json | undefined)?.[step], document);
      expect(found, object.$ref).toBeDefined();
    }
    expect(Object.keys((document.components as Json).securitySchemes as Json)).toEqual(["session"]);
  });

  it("uses JSON Schema as OpenAPI 3.1 has it", () => {
    const schemas = [...objects(document)].filter(([path]) => path.endsWith("/schema"));
    expect(schemas.length).toBeGreaterThan(30);
    const faults = schemas.flatMap(([path, schema]) =>
      [...objects(schema, path)]
        // What `properties` holds are schemas; it is none itself.
        .filter(([inner]) => !inner.endsWith("/properties") && !inner.endsWith("/default"))
        .flatMap(([inner, object]) => schemaFaults(object, inner)),
    );
    expect(faults).toEqual([]);
  });

  it("states the limits that the server enforces", () => {
    const { schema } = operationOf({ path: "/bias/solve", method: "post" }).requestBody?.content[
      "application/json"
    ] ?? { schema: {} };
    type Node = { properties: Record<string, Node>; anyOf?: object[]; minimum?: number; maximum?: number };
    const { stage } = (schema as Node).properties;
    expect(stage.properties.vdd).toMatchObject({ minimum: 0.5, maximum: 450 });
    // 0 stands for a resistor that a circuit doesn't have.
    const [none, some] = stage.properties.r1.anyOf ?? [];
    expect(none).toMatchObject({ enum: [0] });
    expect(some).toMatchObject({ minimum: 0.1, maximum: 100e6 });
  });
});

describe("the page to read it on", () => {
  it("runs under the content policy: no script or style of its own, nothing from elsewhere", async () => {
    const page = await supertest(api.app).get(`${BASE}/docs/`).expect(200);
    const policy = page.headers["content-security-policy"];
    expect(policy).toContain("script-src 'self'");
    expect(policy).toContain("style-src 'self'");
    expect(policy).not.toContain("unsafe");
    for (const [, attributes, content] of page.text.matchAll(/<script([^>]*)>([\s\S]*?)<\/script>/g)) {
      expect(content.trim()).toBe("");
      expect(attributes).toMatch(/src="\.\//);
    }
    expect(page.text).not.toMatch(/<style|\sstyle=|\son\w+=|(?:src|href)="(?:https?:)?\/\//);
  });

  it("is found without the slash at its end, too", async () => {
    const answer = await supertest(api.app).get(`${BASE}/docs`).expect(301);
    expect(answer.headers.location).toBe(`${BASE}/docs/`);
  });

  it("loads scripts and styles of the right kind", async () => {
    const page = await supertest(api.app).get(`${BASE}/docs/`);
    const files = [...page.text.matchAll(/(?:src|href)="\.\/([^"]+\.(js|css))"/g)];
    expect(files.length).toBeGreaterThan(2);
    for (const [, file, kind] of files) {
      const asset = await supertest(api.app).get(`${BASE}/docs/${file}`).expect(200);
      expect(asset.headers["content-type"]).toMatch(kind === "js" ? /javascript/ : /css/);
      expect(asset.headers["x-content-type-options"]).toBe("nosniff");
    }
  });
});
