import { z } from "zod";
import type { PointOnEarth, TravelTable } from "@/lib/planning/fleet";
import type { TravelService } from "@/lib/usecases/use-case";
import { log } from "./log";

/** Places a side of one request: services take about a hundred coordinates at a time. */
const BLOCK = 50;
const AT_ONCE = 4;
const TIMEOUT_MS = 8_000;
const REMEMBERED = 400_000;

const answerSchema = z.object({
  code: z.literal("Ok"),
  durations: z.array(z.array(z.number().nonnegative().nullable())),
  distances: z.array(z.array(z.number().nonnegative().nullable())),
});

interface Leg {
  readonly seconds: number;
  readonly metres: number;
}

/**
 * Driving times from a service that answers the open `table/v1` request of OSRM:
 * `{url}/table/v1/driving/{lon},{lat};…?annotations=duration,distance&sources=…&destinations=…`.
 * Legs are remembered, so that pricing an edit asks for nothing.
 */
export function tableService(fetchFrom: typeof fetch = fetch): TravelService {
  const known = new Map<string, Leg>();
  return {
    async table(url, places) {
      try {
        await learn(known, fetchFrom, url, places);
        return { ok: true, table: assemble(known, url, places) };
      } catch (error) {
        const reason = reasonOf(error);
        log.warn({ act: "travel-table", reason }, "driving times by the great circle instead");
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

function pointText(place: PointOnEarth): string {
  return `${place.longitude.toFixed(5)},${place.latitude.toFixed(5)}`;
}

function legKey(url: string, from: PointOnEarth, to: PointOnEarth): string {
  return `${url}|${pointText(from)}|${pointText(to)}`;
}

/** Asks for the blocks of legs that are not all known yet, a few at a time. */
async function learn(
  known: Map<string, Leg>,
  fetchFrom: typeof fetch,
  url: string,
  places: readonly PointOnEarth[],
): Promise<void> {
  if (known.size > REMEMBERED) known.clear();
  const blocks = Array.from({ length: Math.ceil(places.length / BLOCK) }, (_, i) =>
    places.slice(i * BLOCK, (i + 1) * BLOCK),
  );
  const wanted = blocks.flatMap((from) => blocks.map((to) => ({ from, to })));
  const missing = wanted.filter(({ from, to }) =>
    from.some((a) => to.some((b) => !known.has(legKey(url, a, b)))),
  );
  for (let i = 0; i < missing.length; i += AT_ONCE) {
    await Promise.all(
      missing.slice(i, i + AT_ONCE).map(({ from, to }) => ask(known, fetchFrom, url, from, to)),
    );
  }
}

async function ask(
  known: Map<string, Leg>,
  fetchFrom: typeof fetch,
  url: string,
  from: readonly PointOnEarth[],
  to: readonly PointOnEarth[],
): Promise<void> {
  const range = (start: number, length: number) =>
    Array.from({ length }, (_, i) => start + i).join(";");
  const query = new URLSearchParams({ annotations: "duration,distance" });
  const sides = `sources=${range(0, from.length)}&destinations=${range(from.length, to.length)}`;
  const points = [...from, ...to].map(pointText).join(";");
  const address = `${url.replace(/\/+$/, "")}/table/v1/driving/${points}?${query}&${sides}`;
  const response = await fetchFrom(address, { signal: AbortSignal.timeout(TIMEOUT_MS) });
  if (!response.ok) throw new Refused(`the travel service answered ${response.status}`);
  const { durations, distances } = answerSchema.parse(await response.json());
  from.forEach((a, i) =>
    to.forEach((b, j) => {
      const seconds = durations[i]?.[j] ?? null;
      const metres = distances[i]?.[j] ?? null;
      if (seconds === null || metres === null) {
        throw new Refused("the travel service knows no road to one of the sites");
      }
      known.set(legKey(url, a, b), { seconds: Math.round(seconds), metres: Math.round(metres) });
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
