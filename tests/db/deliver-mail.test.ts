/** Mails: ordered in a transaction, sent once, retried when it can help, failures visible. */
import { beforeAll, describe, expect, it } from "vitest";
import { previewLink, previewRound } from "@/emails/preview-data";
import { deliverMail } from "@/lib/usecases/deliver-mail";
import { type MailOrder, queueMail } from "@/lib/usecases/queue-mail";
import { sendDigests } from "@/lib/usecases/send-digests";
import type { Deps } from "@/lib/usecases/use-case";
import { testDatabase } from "../support/database";
import { systemActor, testDeps } from "../support/deps";
import { smallRegister } from "../support/small-register";

const { db } = await testDatabase();
const deps = testDeps(db);
let supervisorId = "";

beforeAll(async () => {
  const register = await smallRegister(db);
  supervisorId = (await register.actor(["supervisor"])).personId;
});

const order = (key: string, more: Partial<MailOrder> = {}): MailOrder => ({
  template: "invitation",
  toEmail: "ada@quillmere.example",
  toPersonId: null,
  subject: "You are invited",
  props: { ...previewLink },
  idempotencyKey: key,
  ...more,
});

async function queued(key: string, more: Partial<MailOrder> = {}): Promise<string> {
  await db.transaction().execute((trx) => queueMail(trx, deps, order(key, more)));
  return String(deps.enqueued.at(-1)?.data.mailId);
}
const stateOf = (id: string) =>
  db.selectFrom("outboundMail").selectAll().where("id", "=", id).executeTakeFirstOrThrow();

describe("mails", () => {
  it("are ordered once for one key, and not at all when the change is rolled back", async () => {
    await queued("once");
    const jobs = deps.enqueued.length;
    await db.transaction().execute((trx) => queueMail(trx, deps, order("once")));
    expect(deps.enqueued).toHaveLength(jobs);
    await db
      .transaction()
      .execute(async (trx) => {
        await queueMail(trx, deps, order("rolled back"));
        throw new Error("stop");
      })
      .catch(() => undefined);
    const rows = await db.selectFrom("outboundMail").select("idempotencyKey").execute();
    expect(rows.map((row) => row.idempotencyKey)).toEqual(["once"]);
  });

  it("are sent once however often the job runs", async () => {
    const mailId = await queued("twice");
    expect(await deliverMail(deps, systemActor, { mailId })).toEqual({ sent: true });
    expect(await deliverMail(deps, systemActor, { mailId })).toEqual({ sent: false });
    expect(deps.sent.filter((mail) => mail.idempotencyKey === "twice")).toHaveLength(1);
    expect((await stateOf(mailId)).state).toBe("sent");
  });

  it("carry the calendar file with a round", async () => {
    const props = { ...previewRound };
    const mailId = await queued("round", { template: "round-published", props });
    await deliverMail(deps, systemActor, { mailId });
    const attachment = deps.sent.at(-1)?.attachments[0];
    expect(attachment?.contentType).toContain("method=PUBLISH");
    expect(attachment?.content).toContain("UID:round-1@wanewright.example");
  });

  it("stay queued with the reason when another attempt may help, and fail when none can", async () => {
    const failing = (retry: boolean): Deps => ({
      ...deps,
      mailer: { send: async () => ({ ok: false, reason: "provider says no", retry }) },
    });
    const soft = await queued("soft");
    await expect(deliverMail(failing(true), systemActor, { mailId: soft })).rejects.toThrow(
      "provider says no",
    );
    expect(await stateOf(soft)).toMatchObject({ state: "queued", lastError: "provider says no" });
    const hard = await queued("hard");
    await deliverMail(failing(false), systemActor, { mailId: hard });
    expect(await stateOf(hard)).toMatchObject({ state: "failed", attempts: 1 });
  });
});

describe("digests", () => {
  it("are ordered once a chosen day, at the chosen hour, by whichever worker comes first", async () => {
    await db
      .insertInto("digestSetting")
      .values({ personId: supervisorId, weekdays: [2], sendAt: "07:00" })
      .execute();
    // 2026-12-01 is a Tuesday; London is on UTC in December.
    deps.setNow(new Date("2026-12-01T06:59:00Z"));
    expect(await sendDigests(deps, systemActor, {})).toEqual({ ordered: 0 });
    deps.setNow(new Date("2026-12-01T07:01:00Z"));
    const both = await Promise.all([
      sendDigests(deps, systemActor, {}),
      sendDigests(deps, systemActor, {}),
    ]);
    expect(both.map((result) => result.ordered).sort()).toEqual([0, 1]);
    deps.setNow(new Date("2026-12-02T07:01:00Z"));
    expect(await sendDigests(deps, systemActor, {})).toEqual({ ordered: 0 });
  });
});
