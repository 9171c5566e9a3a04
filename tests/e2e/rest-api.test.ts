/**
 * The REST entrances over HTTP, through the running product: what a gateway sends and what it is
 * answered, who may fetch which file. Statuses by RFC 9110 (400, 401 with WWW-Authenticate, 403,
 * 413, 422), RFC 4918 (207) and RFC 6585 (429); files by RFC 4180.
 */
import { createHash, randomBytes, randomUUID } from "node:crypto";
import { request } from "node:http";
import { parse } from "csv-parse/sync";
import type { APIRequestContext, Browser } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { connect } from "@/db/client";
import { CALLS_A_MINUTE } from "@/lib/server/limit-calls";
import { type DemoRole, openBrowser, openPage, productUrl, signIn } from "../support/browser";

const db = connect(process.env.DATABASE_URL ?? "", { max: 2 });
const READINGS = "/api/v1/readings";
const MINUTE_MS = 60_000;
let browser: Browser;
let writer: string;
let reader: string;
let asset: { tag: string; millivolts: number };

beforeAll(async () => {
  browser = await openBrowser();
  writer = await makeKey(["readings:write"]);
  reader = await makeKey(["register:read"]);
  asset = await someAsset();
});
afterAll(async () => {
  await browser.close();
  await db.destroy();
});

/** A key as Settings makes them: only the hash of its secret is kept. */
async function makeKey(scopes: string[], revoked = false): Promise<string> {
  const secret = `wane_${randomBytes(32).toString("base64url")}`;
  const keyHash = createHash("sha256").update(secret).digest("hex");
  const row = { id: randomUUID(), name: "Test gateway", prefix: secret.slice(0, 10), keyHash };
  const revokedAt = revoked ? new Date() : null;
  await db
    .insertInto("apiKey")
    .values({ ...row, scopes, createdAt: new Date(), revokedAt })
    .execute();
  return secret;
}

/** An asset in service whose last voltage at rest is a voltage that will be believed again. */
async function someAsset() {
  const row = await db
    .selectFrom("reading")
    .innerJoin("pack", "pack.id", "reading.packId")
    .innerJoin("asset", "asset.id", "pack.assetId")
    .select(["asset.tag", "reading.millivolts"])
    .where("pack.removedAt", "is", null)
    .where("reading.kind", "=", "resting")
    .where("reading.doubt", "is", null)
    .orderBy("reading.at", "desc")
    .limit(1)
    .executeTakeFirstOrThrow();
  return row;
}

const reading = (more: object = {}) => ({
  ...{ id: randomUUID(), tag: asset.tag, at: new Date(Date.now() - MINUTE_MS).toISOString() },
  ...{ millivolts: asset.millivolts, kind: "resting", ...more },
});

interface ErrorBody {
  error: { code: string; message: string; faults: { field: string; message: string }[] };
}

async function post(key: string | null, body: unknown) {
  const answer = await fetch(productUrl(READINGS), {
    method: "POST",
    headers: {
      "content-type": "application/json",
      ...(key !== null && { authorization: `Bearer ${key}` }),
    },
    body: typeof body === "string" ? body : JSON.stringify(body),
  });
  return { status: answer.status, headers: answer.headers, body: await answer.json() };
}

const stored = (ids: string[]) =>
  db.selectFrom("reading").select(["id", "millivolts", "source"]).where("id", "in", ids).execute();

describe("POST /api/v1/readings", () => {
  it("logs a batch, judges each item by itself, and keeps the sound ones", async () => {
    const good = reading();
    const noTag = reading({ tag: "NO-SUCH-TAG" });
    const noUnit = { ...reading(), millivolts: 3.48 };
    const { status, body } = await post(writer, { readings: [good, noTag, noUnit] });
    expect(status).toBe(207);
    expect(body).toMatchObject({ logged: 1, repeated: 0, refused: 2 });
    expect(body.results).toMatchObject([
      { index: 0, id: good.id, status: "logged", faults: [] },
      { index: 1, id: noTag.id, status: "refused", faults: [{ field: "tag" }] },
      { index: 2, id: noUnit.id, status: "refused", faults: [{ field: "millivolts" }] },
    ]);
    const rows = await stored([good.id, noTag.id, noUnit.id]);
    expect(rows).toEqual([{ id: good.id, millivolts: asset.millivolts, source: "api" }]);
  });

  it("takes the same batch again and changes nothing", async () => {
    const batch = { readings: [reading(), reading({ kind: "loaded", loadUa: 20_000 })] };
    expect((await post(writer, batch)).body).toMatchObject({ logged: 2, repeated: 0 });
    const again = await post(writer, batch);
    expect(again.status).toBe(200);
    expect(again.body).toMatchObject({ logged: 0, repeated: 2, refused: 0 });
    expect(await stored(batch.readings.map((r) => r.id))).toHaveLength(2);
  });

  it("refuses an id that was used for another voltage", async () => {
    const first = reading();
    await post(writer, { readings: [first] });
    const other = { ...first, millivolts: first.millivolts - 10 };
    const { body } = await post(writer, { readings: [other] });
    expect(body.results).toMatchObject([{ status: "refused", faults: [{ field: "id" }] }]);
    expect(await stored([first.id])).toMatchObject([{ millivolts: first.millivolts }]);
  });

  it("answers 401 to no key, a wrong one and a revoked one, and says how to sign in", async () => {
    const revoked = await makeKey(["readings:write"], true);
    for (const key of [null, "wane_wrong", revoked]) {
      const { status, headers, body } = await post(key, { readings: [reading()] });
      expect(status).toBe(401);
      expect(headers.get("www-authenticate")).toMatch(/^Bearer\b/);
      expect((body as ErrorBody).error.code).toBe("not_signed_in");
    }
  });

  it("answers 403 to a key without the right, and logs nothing", async () => {
    const one = reading();
    const { status, body } = await post(reader, { readings: [one] });
    expect(status).toBe(403);
    expect((body as ErrorBody).error).toMatchObject({ code: "forbidden" });
    expect(await stored([one.id])).toEqual([]);
  });

  it("answers 400 to what is no JSON, and names the sign at which it ends to be", async () => {
    const { status, body } = await post(writer, '{"readings": [}');
    expect(status).toBe(400);
    const { code, faults } = (body as ErrorBody).error;
    expect(code).toBe("malformed");
    expect(faults[0]).toMatchObject({ field: "body" });
    expect(faults[0]?.message).toContain("Unexpected token '}'");
  });

  it("answers 422 to JSON of another shape, naming the field", async () => {
    const none = await post(writer, { readings: [] });
    const other = await post(writer, { voltages: [] });
    const many = await post(writer, { readings: Array.from({ length: 1001 }, () => ({})) });
    for (const { status, body } of [none, other, many]) {
      expect(status).toBe(422);
      expect((body as ErrorBody).error.faults[0]).toMatchObject({ field: "readings" });
    }
  });

  it("answers 413 to a body that is too large, announced or not", async () => {
    const large = JSON.stringify({ readings: [{ note: "x".repeat(1_100_000) }] });
    const announced = await post(writer, large);
    expect(announced.status).toBe(413);
    expect((announced.body as ErrorBody).error.faults[0]).toMatchObject({ field: "body" });
    expect(await postInChunks(large)).toBe(413);
  });
});

/** Without a Content-Length: in chunks (RFC 9112, 7.1). */
function postInChunks(body: string): Promise<number | undefined> {
  return new Promise((resolve, reject) => {
    const call = request(
      productUrl(READINGS),
      {
        method: "POST",
        headers: { "content-type": "application/json", authorization: `Bearer ${writer}` },
      },
      (answer) => {
        answer.resume();
        resolve(answer.statusCode);
      },
    );
    call.on("error", reject);
    for (let at = 0; at < body.length; at += 60_000) call.write(body.slice(at, at + 60_000));
    call.end();
  });
}

describe("a key that calls too often", () => {
  it("is answered 429 with when to come again; other keys are not held up", async () => {
    const busy = await makeKey(["register:read"]);
    const call = () =>
      fetch(productUrl("/api/v1/sites?q=none-such"), {
        headers: { authorization: `Bearer ${busy}` },
      });
    const statuses: number[] = [];
    while (statuses.length < CALLS_A_MINUTE) {
      const ten = await Promise.all(Array.from({ length: 10 }, call));
      statuses.push(...ten.map((answer) => answer.status));
    }
    expect(new Set(statuses)).toEqual(new Set([200]));
    const over = await call();
    expect(over.status).toBe(429);
    expect(Number(over.headers.get("retry-after"))).toBeGreaterThan(0);
    expect(((await over.json()) as ErrorBody).error.code).toBe("too_many");
    expect((await fetch(productUrl("/api/v1/assets"), asKey(reader))).status).toBe(200);
  });
});

const asKey = (key: string) => ({ headers: { authorization: `Bearer ${key}` } });

describe("what a key may read", () => {
  it("is the register with register:read, and nothing with readings:write", async () => {
    const answer = await fetch(productUrl(`/api/v1/assets?q=${asset.tag}`), asKey(reader));
    expect(answer.status).toBe(200);
    expect(JSON.stringify(await answer.json())).toContain(asset.tag);
    const one = await fetch(productUrl(`/api/v1/assets/${asset.tag}`), asKey(reader));
    expect(one.status).toBe(200);
    const none = await fetch(productUrl("/api/v1/assets/NO-SUCH-TAG"), asKey(reader));
    expect(none.status).toBe(404);
    expect((await fetch(productUrl("/api/v1/assets"), asKey(writer))).status).toBe(403);
    expect((await fetch(productUrl("/api/v1/exports/assets"), asKey(reader))).status).toBe(403);
  });
});

const LISTS = [
  ...["assets", "sites", "installs", "readings", "cell-types", "device-models", "lots", "moves"],
  ...["horizon", "claims", "costs"],
];
const FOR_ADMINISTRATORS = ["people", "mails", "audit"];
const ALLOWED: readonly [role: DemoRole, yes: readonly string[], no: readonly string[]][] = [
  ["dispatcher", LISTS, FOR_ADMINISTRATORS],
  ["supervisor", LISTS, ["people"]],
  ["technician", [], [...LISTS, ...FOR_ADMINISTRATORS]],
  ["administrator", [...LISTS, ...FOR_ADMINISTRATORS], []],
];

describe.each(ALLOWED)("files for a %s", (role, yes, no) => {
  let http: APIRequestContext;
  let close: () => Promise<void>;
  beforeAll(async () => {
    const { page, context } = await openPage(browser, "desktop");
    await signIn(page, role);
    http = context.request;
    close = () => context.close();
  });
  afterAll(() => close());

  const fetchList = (list: string) => http.get(productUrl(`/api/v1/exports/${list}`));

  it.runIf(yes.length > 0)("come as CSV with a head and as many cells in every row", async () => {
    for (const list of yes) {
      const answer = await fetchList(list);
      expect(answer.status(), list).toBe(200);
      expect(answer.headers()["content-type"], list).toMatch(/^text\/csv; ?charset=utf-8/i);
      expect(answer.headers()["content-disposition"], list).toMatch(/^attachment; filename=/);
      // Strict: throws where a row is longer or shorter than the head.
      const rows = parse(await answer.body(), { bom: true }) as string[][];
      expect(rows[0]?.length ?? 0, list).toBeGreaterThan(3);
    }
  });

  it.runIf(no.length > 0)("are refused where the role may not see the list", async () => {
    for (const list of no) expect((await fetchList(list)).status(), list).toBe(403);
  });
});

describe("GET /api/health", () => {
  it("answers 200 without a sign-in, tells the schema, and is kept nowhere", async () => {
    const answer = await fetch(productUrl("/api/health"));
    expect(answer.status).toBe(200);
    expect(answer.headers.get("cache-control")).toBe("no-store");
    expect(await answer.json()).toMatchObject({ ok: true, database: "reachable" });
  });
});
