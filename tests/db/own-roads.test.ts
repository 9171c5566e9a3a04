import { expect, it } from "vitest";
import { getOrganisation } from "@/db/queries/organisation";
import { storedLegs } from "@/lib/server/travel-legs";
import { setOwnRoads } from "@/lib/usecases/set-own-roads";
import { travelTimes } from "@/lib/usecases/travel-times";
import { testDatabase } from "../support/database";
import { systemActor, testDeps } from "../support/deps";
import { smallRegister } from "../support/small-register";

const { db } = await testDatabase();
await smallRegister(db);
let now = new Date("2026-12-01T09:00:00Z");
const deps = { ...testDeps(db, now), now: () => now };
const places = [
  { latitude: 52.5, longitude: 0.1 },
  { latitude: 52.5, longitude: 0.13 },
];
const feature = (id: string, kmh: unknown, coordinates: unknown) => ({
  type: "Feature",
  properties: { id, kmh },
  geometry: { type: "LineString", coordinates },
});
const lane = feature("lane", 30, [
  [0.1, 52.5],
  [0.13, 52.5],
]);
const set = (...features: unknown[]) => {
  now = new Date(now.getTime() + 60_000);
  return setOwnRoads(deps, systemActor, { collection: { features } as never });
};
const times = async () => travelTimes(deps, await getOrganisation(db), places);

it("drives on own roads as soon as there are some, and on none when they are taken away", async () => {
  const straight = await times();
  expect(straight.source).toEqual({ kind: "great_circle", trouble: null });
  const village = { type: "Feature", properties: {}, geometry: { type: "Point", coordinates: [] } };
  expect(await set(lane, village)).toEqual({ roads: 1 });
  const driven = await times();
  expect(driven.source).toEqual({ kind: "own_roads", trouble: null });
  // 0.03 degrees of longitude at 52.5 degrees north are 2031 m on the mean sphere.
  expect(driven.table.metres[1]).toBeCloseTo(2031, -1);
  expect(driven.table.seconds[1]).toBeCloseTo((2031 * 3.6) / 30, -1);

  // The same roads, twice as fast: the graph of before must not be remembered.
  await set(feature("lane", 60, lane.geometry.coordinates));
  expect((await times()).table.seconds[1]).toBeCloseTo((2031 * 3.6) / 60, -1);
  expect(await set()).toEqual({ roads: 0 });
  expect((await times()).source.kind).toBe("great_circle");
});

it("says so where a site lies off the roads", async () => {
  await set(
    feature("far", 30, [
      [9, 50],
      [9.1, 50],
    ]),
  );
  const { source } = await times();
  expect(source.kind).toBe("great_circle");
  expect(source.trouble).toContain("off the organisation's own roads");
  await set();
});

it("refuses what is no road by feature and field, and keeps what was there", async () => {
  await set(lane);
  await expect(set(lane, feature("x", 500, lane.geometry.coordinates))).rejects.toThrow(
    /Feature 2, properties\.kmh/,
  );
  await expect(set(feature("x", 30, [[0.1, 52.5]]))).rejects.toThrow(/a road has two ends/);
  await expect(set(lane, lane)).rejects.toThrow("The road id lane is there twice");
  expect((await times()).source.kind).toBe("own_roads");
  await set();
});

it("keeps a service's legs for a month, the newest answer for each", async () => {
  const store = storedLegs(db, () => now);
  const leg = { fromPoint: "0.1,52.5", toPoint: "0.13,52.5", seconds: 200, metres: 2100 };
  await store.save("http://roads.example", [leg]);
  await store.save("http://roads.example", [{ ...leg, seconds: 220 }]);
  const points = [leg.fromPoint, leg.toPoint];
  expect(await store.load("http://roads.example", points)).toEqual([{ ...leg, seconds: 220 }]);
  expect(await store.load("http://other.example", points)).toEqual([]);
  now = new Date("2027-01-05T12:00:00Z");
  expect(await store.load("http://roads.example", points)).toEqual([]);
});
