import { createServer, type Server } from "node:http";
import type { AddressInfo } from "node:net";
import { afterEach, expect, it } from "vitest";
import { tableService } from "@/lib/server/travel-table";
import { travelTimes } from "@/lib/usecases/travel-times";
import type { Organisation } from "@/db/queries/organisation";
import type { TravelLeg } from "@/db/queries/travel-legs";
import type { Deps } from "@/lib/usecases/use-case";

// The request and answer of the table service as OSRM's HTTP API documents them (v1: lon,lat pairs
// by semicolon, sources and destinations as indices, durations in seconds, distances in metres).
let server: Server | undefined;
afterEach(() => server?.close());

const places = Array.from({ length: 60 }, (_, i) => ({ latitude: 52.5 + i / 100, longitude: 0.1 }));

async function service(answer: (asked: URL) => { status: number; body: unknown }) {
  const asked: URL[] = [];
  server = createServer((request, response) => {
    const url = new URL(request.url ?? "/", "http://service");
    asked.push(url);
    const { status, body } = answer(url);
    response.writeHead(status, { "content-type": "application/json" });
    response.end(JSON.stringify(body));
  });
  await new Promise<void>((ready) => server?.listen(0, "127.0.0.1", ready));
  return { url: `http://127.0.0.1:${(server.address() as AddressInfo).port}`, asked };
}

/** Answers with tables told from the latitudes, so that a mixed-up row or column shows. */
function fake(url: URL) {
  const points = url.pathname
    .split("/")
    .at(-1)!
    .split(";")
    .map((p) => p.split(",").map(Number));
  const pick = (name: string) => url.searchParams.get(name)!.split(";").map(Number);
  const table = (factor: number) =>
    pick("sources").map((i) =>
      pick("destinations").map((j) => Math.round((points[j]![1]! - points[i]![1]! + 9) * factor)),
    );
  return { status: 200, body: { code: "Ok", durations: table(100), distances: table(1000) } };
}

/** No roads of its own: the database is not asked. */
const db = {} as Deps["db"];

const organisation = (travelTableUrl: string | null) =>
  ({ travelTableUrl, roadsSetAt: null, detourFactor: 1.3, roadSpeedKmh: 45 }) as Organisation;

it("asks in blocks, puts every leg in its place, and remembers", async () => {
  const { url, asked } = await service(fake);
  const travel = tableService();
  const { table, source } = await travelTimes({ travel, db }, organisation(url), places);
  expect(source).toEqual({ kind: "table_service", trouble: null });
  expect(table.seconds[3 * 60 + 55]).toBe(Math.round((0.52 + 9) * 100));
  expect(table.metres[55 * 60 + 3]).toBe(Math.round((-0.52 + 9) * 1000));
  expect(table.seconds[7 * 60 + 7]).toBe(0);
  expect(asked).toHaveLength(4);
  expect(asked[0]?.pathname).toContain("/table/v1/driving/0.10000,52.50000;");
  await travelTimes({ travel, db }, organisation(url), places);
  expect(asked).toHaveLength(4);
});

it.each([
  ["refuses", { status: 503, body: {} }, "answered 503"],
  ["answers nonsense", { status: 200, body: { code: "Ok" } }, "makes no sense"],
  [
    "knows no road",
    { status: 200, body: { code: "Ok", durations: [[null]], distances: [[null]] } },
    "knows no road",
  ],
])("falls back to the great circle where it %s, and says why", async (_, answer, reason) => {
  const { url } = await service(() => answer);
  const { table, source } = await travelTimes(
    { travel: tableService(), db },
    organisation(url),
    places.slice(0, 2),
  );
  expect(source.kind).toBe("great_circle");
  expect(source.trouble).toContain(reason);
  // A hundredth of a degree of latitude is 1.112 km on the mean sphere; with detour 1.446 km.
  expect(table.metres[1]).toBeCloseTo(1446, -1);
});

it("falls back where nobody listens", async () => {
  const travel = tableService();
  const { source } = await travelTimes({ travel, db }, organisation("http://127.0.0.1:9"), places);
  expect(source.trouble).toContain("cannot be reached");
});

it("asks again where the trouble is over in a moment", async () => {
  let refusals = 2;
  const { url, asked } = await service((from) =>
    refusals-- > 0 ? { status: 503, body: {} } : fake(from),
  );
  const travel = tableService();
  const { source } = await travelTimes({ travel, db }, organisation(url), places.slice(0, 2));
  expect(source).toEqual({ kind: "table_service", trouble: null });
  expect(asked).toHaveLength(3);
});

it("keeps legs beyond the process: another one asks the store, not the service", async () => {
  const { url, asked } = await service(fake);
  const kept: TravelLeg[] = [];
  const store = {
    load: async () => kept,
    save: async (_: string, legs: readonly TravelLeg[]) => void kept.push(...legs),
  };
  const two = places.slice(0, 2);
  const first = await tableService(store).table(url, two);
  const second = await tableService(store).table(url, two);
  expect(asked).toHaveLength(1);
  expect(second).toEqual(first);
});
