import { setTimeout as pause } from "node:timers/promises";
import { z } from "zod";
import type { TravelLeg } from "@/db/queries/travel-legs";
import type { PointOnEarth, TravelTable } from "@/lib/planning/fleet";
import type { TravelService } from "@/lib/usecases/use-case";
import { log } from "./log";
import type { LegStore } from "./travel-legs";

/** Places a side of one request: services take about a hundred coordinates at a time. */
const BLOCK = 50;
const AT_ONCE = 4;
const TIMEOUT_MS = 8_000;
const REMEMBERED = 400_000;
/** Pauses before a request that failed for the moment is sent again, milliseconds. */
const PAUSES_MS = [200, 800];

const answerSchema = z.object({
  code: z.literal("Ok"),
  durations: z.array(z.array(z.number().nonnegative().nullable())),
  distances: z.array(z.array(z.number().nonnegative().nullable())),
});

interface Leg {
  readonly seconds: number;
  readonly metres: number;
}

interface Service {
  readonly url: string;
  readonly known: Map<string, Leg>;
  readonly store: LegStore | null;
  readonly fetchFrom: typeof fetch;
}

/**
 * Driving times from a service that answers the open `table/v1` request of OSRM:
 * `{url}/table/v1/driving/{lon},{lat};…?annotations=duration,distance&sources=…&destinations=…`.
 * Legs are remembered, in this process and in the store, so that pricing an edit asks for nothing.
 */
export function tableService(
  store: LegStore | null = null,
  fetchFrom: typeof fetch = fetch,
): TravelService {
  const known = new Map<string, Leg>();
  return {
    async table(url, places) {
      try {
        await learn({ url, known, store, fetchFrom }, places);
        return { ok: true, table: assemble(known, url, places) };
      } catch (error) {
        const reason = reasonOf(error);
        log.warn({ act: "travel-table", reason }, "driving times without the travel service");
        return { ok: false, reason };
      }
    },
  };
}

function reasonOf(error: unknown): string {
  if (error instanceof z.ZodError) return "the travel service's answer makes no sense";
  if (error instanceof Error && error.name === "TimeoutError") {
    return `the travel service did not answer within ${TIMEOUT_MS / 1000} s`;
  }
  return error instanceof Refused ? error.message : "the travel service cannot be reached";
}

class Refused extends Error {}

/** The service's trouble may be over in a moment. */
class Busy extends Refused {}

function pointText(place: PointOnEarth): string {
  return `${place.longitude.toFixed(5)},${place.latitude.toFixed(5)}`;
}

function legKey(url: string, from: PointOnEarth, to: PointOnEarth): string {
  return `${url}|${pointText(from)}|${pointText(to)}`;
}

/** Blocks of legs that are not all known. */
function missingBlocks({ known, url }: Service, places: readonly PointOnEarth[]) {
  const blocks = Array.from({ length: Math.ceil(places.length / BLOCK) }, (_, i) =>
    places.slice(i * BLOCK, (i + 1) * BLOCK),
  );
  const wanted = blocks.flatMap((from) => blocks.map((to) => ({ from, to })));
  return wanted.filter(({ from, to }) =>
    from.some((a) => to.some((b) => !known.has(legKey(url, a, b)))),
  );
}

/** Looks the missing legs up in the store, then asks for the rest, a few blocks at a time. */
async function learn(service: Service, places: readonly PointOnEarth[]): Promise<void> {
  const { known, store, url } = service;
  if (known.size > REMEMBERED) known.clear();
  if (missingBlocks(service, places).length === 0) return;
  for (const leg of (await store?.load(url, places.map(pointText))) ?? []) {
    known.set(`${url}|${leg.fromPoint}|${leg.toPoint}`, leg);
  }
  const missing = missingBlocks(service, places);
  for (let i = 0; i < missing.length; i += AT_ONCE) {
    const answers = await Promise.all(
      missing.slice(i, i + AT_ONCE).map(({ from, to }) => ask(service, from, to)),
    );
    const legs = answers.flat();
    for (const leg of legs) known.set(`${url}|${leg.fromPoint}|${leg.toPoint}`, leg);
    await store?.save(url, legs);
  }
}

/** Asks for one block, again after a pause where the trouble may be over in a moment. */
async function ask(
  service: Service,
  from: readonly PointOnEarth[],
  to: readonly PointOnEarth[],
): Promise<TravelLeg[]> {
  for (const pauseMs of PAUSES_MS) {
    try {
      return await askOnce(service, from, to);
    } catch (error) {
      const momentary = error instanceof Busy || error instanceof TypeError;
      if (!momentary) throw error;
      await pause(pauseMs);
    }
  }
  return askOnce(service, from, to);
}

async function askOnce(
  { url, fetchFrom }: Service,
  from: readonly PointOnEarth[],
  to: readonly PointOnEarth[],
): Promise<TravelLeg[]> {
  const range = (start: number, length: number) =>
    Array.from({ length }, (_, i) => start + i).join(";");
  const query = new URLSearchParams({ annotations: "duration,distance" });
  const sides = `sources=${range(0, from.length)}&destinations=${range(from.length, to.length)}`;
  const points = [...from, ...to].map(pointText).join(";");
  const address = `${url.replace(/\/+$/, "")}/table/v1/driving/${points}?${query}&${sides}`;
  const response = await fetchFrom(address, { signal: AbortSignal.timeout(TIMEOUT_MS) });
  const { status } = response;
  if (status === 429 || status >= 500) throw new Busy(`the travel service answered ${status}`);
  if (!response.ok) throw new Refused(`the travel service answered ${status}`);
  const { durations, distances } = answerSchema.parse(await response.json());
  return from.flatMap((a, i) =>
    to.map((b, j) => {
      const seconds = durations[i]?.[j] ?? null;
      const metres = distances[i]?.[j] ?? null;
      if (seconds === null || metres === null) {
        throw new Refused("the travel service knows no road to one of the sites");
      }
      const leg = { seconds: Math.round(seconds), metres: Math.round(metres) };
      return { fromPoint: pointText(a), toPoint: pointText(b), ...leg };
    }),
  );
}

function assemble(
  known: ReadonlyMap<string, Leg>,
  url: string,
  places: readonly PointOnEarth[],
): TravelTable {
  const n = places.length;
  const seconds = new Int32Array(n * n);
  const metres = new Int32Array(n * n);
  places.forEach((from, i) =>
    places.forEach((to, j) => {
      if (i === j) return;
      const leg = known.get(legKey(url, from, to))!;
      seconds[i * n + j] = leg.seconds;
      metres[i * n + j] = leg.metres;
    }),
  );
  return { seconds, metres };
}
