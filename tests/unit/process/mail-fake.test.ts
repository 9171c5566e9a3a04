import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { Resend } from "resend";
import { afterAll, beforeEach, describe, expect, it } from "vitest";
import { type MailFake, startMailFake } from "../../../scripts/mail-fake/server";

/**
 * The outside truth is the provider's own SDK (`resend`): what it sends, and how it reads
 * what comes back. Names and statuses: https://resend.com/docs/api-reference/errors.
 */
let clock = new Date("2026-03-02T09:00:00Z");
const folder = mkdtempSync(join(tmpdir(), "mail-fake-"));
const fake: MailFake = await startMailFake({ port: 0, folder, now: () => clock });
const sdk = new Resend("re_test", { baseUrl: fake.address });
afterAll(async () => {
  await fake.close();
  rmSync(folder, { recursive: true });
});

const mail = {
  from: "Quillmere <rounds@quillmere.example>",
  to: ["tess@quillmere.example"],
  subject: "Round on Tuesday",
  html: "<p>Five <b>stops</b></p>",
  text: "Five stops",
};
const order = (body: unknown) =>
  fetch(`${fake.address}/_control`, { method: "POST", body: JSON.stringify(body) });

beforeEach(async () => {
  clock = new Date("2026-03-02T09:00:00Z");
  await fetch(`${fake.address}/_mails`, { method: "DELETE" });
});

describe("sending through the provider's SDK", () => {
  it("keeps a mail with its files and shows it as JSON", async () => {
    const content = Buffer.from("BEGIN:VCALENDAR\r\nEND:VCALENDAR\r\n");
    const files = [{ filename: "round.ics", content, contentType: "text/calendar" }];
    const { data, error } = await sdk.emails.send({ ...mail, attachments: files });
    expect(error).toBeNull();
    const kept = await (await fetch(`${fake.address}/_mails`)).json();
    expect(kept).toHaveLength(1);
    expect(kept[0]).toMatchObject({ id: data?.id, to: mail.to, subject: mail.subject });
    expect(Buffer.from(kept[0].attachments[0].content, "base64")).toEqual(content);
    expect(kept[0].attachments[0].contentType).toBe("text/calendar");
  });

  it("sends once for one idempotency key, however often it is asked", async () => {
    const first = await sdk.emails.send(mail, { idempotencyKey: "round/1" });
    const again = await sdk.emails.send(mail, { idempotencyKey: "round/1" });
    expect(again.data?.id).toBe(first.data?.id);
    expect(fake.mails()).toHaveLength(1);
  });

  it("refuses the same key with another payload, until the key is a day old", async () => {
    await sdk.emails.send(mail, { idempotencyKey: "round/2" });
    const changed = { ...mail, subject: "Round on Wednesday" };
    const refused = await sdk.emails.send(changed, { idempotencyKey: "round/2" });
    expect(refused.error).toMatchObject({ name: "invalid_idempotent_request", statusCode: 409 });
    clock = new Date("2026-03-03T09:00:01Z");
    expect((await sdk.emails.send(changed, { idempotencyKey: "round/2" })).error).toBeNull();
  });

  it("takes a batch whole or not at all", async () => {
    const good = await sdk.batch.send([mail, { ...mail, to: "ned@quillmere.example" }]);
    expect(good.data?.data).toHaveLength(2);
    const bad = await sdk.batch.send([mail, { ...mail, to: "nobody" }]);
    expect(bad.error?.message).toContain("Email 1");
    expect(fake.mails()).toHaveLength(2);
  });
});

describe("refusals", () => {
  it.each([
    ["a recipient without an @", { to: "nobody" }, "validation_error", "to"],
    ["a sender without an @", { from: "Quillmere" }, "invalid_from_address", "from"],
    ["no subject", { subject: undefined }, "missing_required_field", "subject"],
    ["no content", { html: undefined, text: undefined }, "missing_required_field", "html"],
    ["51 recipients", { to: Array(51).fill("a@b.example") }, "validation_error", "to"],
  ])("refuses %s and names the field", async (_, change, name, field) => {
    const { error } = await sdk.emails.send({ ...mail, ...change } as typeof mail);
    expect(error).toMatchObject({ name, statusCode: 422 });
    expect(error?.message).toContain(`\`${field}`);
    expect(fake.mails()).toHaveLength(0);
  });

  it("wants a key", async () => {
    const bare = await fetch(`${fake.address}/emails`, { method: "POST", body: "{}" });
    expect(bare.status).toBe(401);
    expect(await bare.json()).toMatchObject({ name: "missing_api_key" });
    const wrong = await new Resend("sk_1", { baseUrl: fake.address }).emails.send(mail);
    expect(wrong.error).toMatchObject({ statusCode: 401, message: "API key is invalid" });
  });
});

describe("troubles on order", () => {
  it("fails as often as told, then recovers", async () => {
    await order({ fail: { times: 2, status: 429, name: "rate_limit_exceeded" } });
    expect((await sdk.emails.send(mail)).error).toMatchObject({ name: "rate_limit_exceeded" });
    expect((await sdk.emails.send(mail)).error).toMatchObject({ statusCode: 429 });
    expect((await sdk.emails.send(mail)).error).toBeNull();
    expect(fake.mails()).toHaveLength(1);
  });

  it("can hang up: the SDK reports it and does not throw", async () => {
    await order({ hangUp: 1 });
    expect((await sdk.emails.send(mail)).error).toMatchObject({ statusCode: null });
  });

  it("says what is wrong with an order", async () => {
    expect((await order({ fail: { times: "many" } })).status).toBe(422);
  });
});

describe("pages", () => {
  it("shows hostile mail harmlessly", async () => {
    const subject = `<script>alert("x")</script>`;
    const { data } = await sdk.emails.send({ ...mail, subject, html: subject });
    const list = await (await fetch(`${fake.address}/`)).text();
    expect(list).not.toContain("<script");
    const shown = await fetch(`${fake.address}/mails/${data?.id}`);
    expect(await shown.text()).not.toContain("<script");
    const view = await fetch(`${fake.address}/mails/${data?.id}/html`);
    expect(view.headers.get("content-security-policy")).toMatch(/^sandbox allow-popups/);
    expect(view.headers.get("content-security-policy")).not.toContain("allow-scripts");
  });

  it("gives files to download under their names", async () => {
    const files = [{ filename: "Runde März.ics", content: "QQ==", contentType: "text/calendar" }];
    const { data } = await sdk.emails.send({ ...mail, attachments: files });
    const file = await fetch(`${fake.address}/mails/${data?.id}/files/0`);
    expect(file.headers.get("content-disposition")).toContain("Runde%20M%C3%A4rz.ics");
    expect(await file.text()).toBe("A");
  });

  it("keeps the mails over a restart", async () => {
    await sdk.emails.send(mail);
    const second = await startMailFake({ port: 0, folder });
    expect(second.mails().map((kept) => kept.subject)).toEqual([mail.subject]);
    await second.close();
  });
});
