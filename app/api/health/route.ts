import { readHealth } from "@/lib/usecases/read-health";
import { deps } from "@/lib/server/deps";
import { log } from "@/lib/server/log";

/** For load balancers and `npm start`: 200 when the database answers and has a schema. */
export async function GET(): Promise<Response> {
  const answer = { status: 200, body: { ok: true } as Record<string, unknown> };
  try {
    const health = await readHealth(deps(), { kind: "system" }, {});
    Object.assign(answer, { status: health.ok ? 200 : 503, body: health });
  } catch (error) {
    log.error({ act: "read-health", error }, "the database does not answer");
    Object.assign(answer, { status: 503, body: { ok: false, database: "unreachable" } });
  }
  return Response.json(answer.body, {
    status: answer.status,
    headers: { "cache-control": "no-store" },
  });
}
