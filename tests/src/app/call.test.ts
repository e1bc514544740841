import { afterEach, expect, test, vi } from "vitest";
import * as z from "zod/mini";
import { contract, json, stream } from "#shared/api/contract.ts";
import { Problem } from "#shared/problem.ts";
import { addressOf, call, callVersioned, versionNow } from "../../../src/api/call.ts";

const none = z.object({});
const thing = contract({
  name: "changeThing",
  method: "POST",
  path: "/api/surveys/:surveyId/things/:thingId",
  guard: "signed-in",
  summary: "",
  params: z.object({ surveyId: z.string(), thingId: z.string() }),
  query: z.object({ text: z.optional(z.string()) }),
  body: z.object({ count: z.number() }),
  answer: json(z.object({ kept: z.number() })),
});
const upload = contract({
  name: "sendFile",
  method: "POST",
  path: "/api/files",
  guard: "signed-in",
  summary: "",
  params: none,
  query: none,
  body: z.object({ crs: z.optional(z.string()) }),
  upload: { field: "file", maxBytes: 1000 },
  answer: json(z.object({ kept: z.number() })),
});
const bytes = contract({
  name: "readBytes",
  method: "GET",
  path: "/api/bytes",
  guard: "public",
  summary: "",
  params: none,
  query: none,
  body: none,
  answer: stream("application/octet-stream"),
});

type Fetch = (address: string, init: RequestInit) => Promise<Response>;
function fakeFetch(answer: Fetch) {
  const fetch = vi.fn<Fetch>(answer);
  vi.stubGlobal("fetch", fetch);
  return fetch;
}
const params = { surveyId: "s 1", thingId: "ä/b" };

afterEach(() => {
  vi.unstubAllGlobals();
});

test("a call fills the path and query of its contract, sends the body as JSON and parses the answer", async () => {
  const fetch = fakeFetch(() => Promise.resolve(Response.json({ kept: 3, secret: "x" })));
  const answer = await call(thing, { params, query: { text: "a&b" }, body: { count: 3 } });
  expect(answer).toEqual({ kept: 3 });
  const [address, init] = fetch.mock.calls[0] ?? [];
  expect(address).toBe("/api/surveys/s%201/things/%C3%A4%2Fb?text=a%26b");
  expect(init?.method).toBe("POST");
  expect(init?.body).toBe('{"count":3}');
});

test("a refusal of the server is thrown with its code, its text and its question", async () => {
  const told = { code: "area-question", detail: "Say which layer.", question: { kind: "layer", layers: ["a", "b"] } };
  fakeFetch(() => Promise.resolve(Response.json(told, { status: 422 })));
  const refused = await call(thing, { params, body: { count: 1 } }).catch((error: unknown) => error);
  expect(refused).toBeInstanceOf(Problem);
  expect(refused).toMatchObject({ code: "area-question", message: "Say which layer.", question: told.question });
});

test("a network that fails is told as unreachable, an aborted call as cancelled", async () => {
  fakeFetch(() => Promise.reject(new TypeError("Failed to fetch")));
  await expect(call(bytes)).rejects.toMatchObject({ code: "unreachable" });
  const controller = new AbortController();
  controller.abort();
  await expect(call(bytes, { signal: controller.signal })).rejects.toMatchObject({ code: "cancelled" });
});

test("an error page that is no problem is told with the status, and a gateway's as unreachable", async () => {
  fakeFetch(() => Promise.resolve(new Response("<h1>down</h1>", { status: 500 })));
  await expect(call(bytes)).rejects.toMatchObject({ code: "internal" });
  fakeFetch(() => Promise.resolve(new Response("<h1>down</h1>", { status: 502 })));
  await expect(call(bytes)).rejects.toMatchObject({ code: "unreachable" });
});

// The server reads the answers before the file, so the field "body" must come first.
test("an upload sends its body as JSON text before the file", async () => {
  const fetch = fakeFetch(() => Promise.resolve(Response.json({ kept: 1 })));
  const file = new File(["abc"], "fen.geojson");
  await call(upload, { body: { crs: "EPSG:25831" }, file });
  const form = fetch.mock.calls[0]?.[1].body as FormData;
  expect([...form.keys()]).toEqual(["body", "file"]);
  expect(form.get("body")).toBe('{"crs":"EPSG:25831"}');
  expect((form.get("file") as File).name).toBe("fen.geojson");
});

test("a stream comes as bytes", async () => {
  fakeFetch(() => Promise.resolve(new Response(new Uint8Array([1, 2, 250]))));
  const blob = await call(bytes);
  expect([...new Uint8Array(await blob.arrayBuffer())]).toEqual([1, 2, 250]);
});

test("an answer that does not fit its contract is not taken", async () => {
  fakeFetch(() => Promise.resolve(Response.json({ kept: "three" })));
  await expect(call(thing, { params, body: { count: 3 } })).rejects.toThrow();
});

test("an address without one of its parameters is a bug, and names it", () => {
  expect(() => addressOf(thing, { params: { surveyId: "s1" } as typeof params })).toThrow(/thingId/);
});

const settings = z.object({ name: z.string() });
const read = contract({
  name: "readThing",
  method: "GET",
  path: "/api/thing",
  guard: "signed-in",
  summary: "",
  params: none,
  query: none,
  body: none,
  versioned: true,
  answer: json(settings),
});
const change = contract({ ...read, name: "changeThing", method: "PUT", body: settings });

test("what two may edit comes with its ETag as its version, and a write sends the version that was seen", async () => {
  const fetch = fakeFetch((_, { method }) =>
    Promise.resolve(
      Response.json(
        { name: method === "PUT" ? "new" : "old" },
        { headers: { ETag: method === "PUT" ? '"b"' : '"a"' } },
      ),
    ),
  );
  const seen = await callVersioned(read, {});
  expect(seen).toEqual({ value: { name: "old" }, version: '"a"' });
  const kept = await callVersioned(change, { body: { name: "new" }, version: seen.version });
  expect(kept).toEqual({ value: { name: "new" }, version: '"b"' });
  expect(new Headers(fetch.mock.calls[0]?.[1].headers).get("if-match")).toBeNull();
  expect(new Headers(fetch.mock.calls[1]?.[1].headers).get("if-match")).toBe('"a"');
});

test("an answer without an ETag is no version", async () => {
  fakeFetch(() => Promise.resolve(Response.json({ name: "old" })));
  await expect(callVersioned(read, {})).rejects.toThrow(RangeError);
});

test("the refusal of a write on an old version tells what stands now; any other refusal tells nothing of it", async () => {
  const question = { kind: "versions", current: { name: "theirs", more: 1 }, version: '"c"' };
  const refuse = (code: string) => Response.json({ code, detail: "", question }, { status: 412 });
  fakeFetch(() => Promise.resolve(refuse("changed-meanwhile")));
  const stale = await callVersioned(change, { body: { name: "x" }, version: '"a"' }).catch((error: unknown) => error);
  expect(versionNow(change, stale)).toEqual({ value: { name: "theirs" }, version: '"c"' });
  fakeFetch(() => Promise.resolve(refuse("not-allowed")));
  const other = await callVersioned(change, { body: { name: "x" }, version: '"a"' }).catch((error: unknown) => error);
  expect(versionNow(change, other)).toBeNull();
  expect(versionNow(change, new Error("x"))).toBeNull();
});
