import { beforeAll, describe, expect, it } from "vitest";
import { acceptInvitation } from "@/lib/usecases/accept-invitation";
import { choosePassword } from "@/lib/usecases/choose-password";
import { invitePerson } from "@/lib/usecases/invite-person";
import { requestPasswordLink } from "@/lib/usecases/request-password-link";
import { requestSignInLink } from "@/lib/usecases/request-sign-in-link";
import { signInWithPassword } from "@/lib/usecases/sign-in-with-password";
import { signInWithToken } from "@/lib/usecases/sign-in-with-token";
import { switchPerson } from "@/lib/usecases/switch-person";
import { testDatabase } from "@/tests/support/database";
import { testDeps } from "@/tests/support/deps";
import { addPerson, foundBoard, PASSWORD, visitor } from "./house";

const { db } = await testDatabase();
beforeAll(() => foundBoard(db));

const START = new Date("2026-12-01T09:00:00Z");
const later = (minutes: number) => new Date(START.getTime() + minutes * 60_000);
const DEAD = { code: "not_signed_in" };

async function mailsTo(email: string) {
  const rows = await db
    .selectFrom("outboundMail")
    .select(["id", "template", "props", "state"])
    .where("toEmail", "=", email)
    .orderBy("createdAt")
    .execute();
  return rows.map((row) => ({ ...row, props: row.props as Record<string, string> }));
}

async function lastToken(email: string): Promise<string> {
  const url = (await mailsTo(email)).at(-1)?.props.url ?? "";
  return new URL(url).searchParams.get("token") ?? "";
}

describe("a link from a mail", () => {
  it("lets in exactly one of ten who come at once", async () => {
    const { id, email } = await addPerson(db, ["technician"]);
    await requestSignInLink(testDeps(db, START), visitor, { email });
    const token = await lastToken(email);
    const outcomes = await Promise.allSettled(
      Array.from({ length: 10 }, () => signInWithToken(testDeps(db, later(1)), visitor, { token })),
    );
    const letIn = outcomes.filter((outcome) => outcome.status === "fulfilled");
    expect(letIn).toHaveLength(1);
    expect(letIn[0]).toMatchObject({ value: { id, email } });
  });

  it("ends after its time", async () => {
    const { email } = await addPerson(db, ["technician"]);
    await requestSignInLink(testDeps(db, START), visitor, { email });
    const token = await lastToken(email);
    await expect(
      signInWithToken(testDeps(db, later(15)), visitor, { token }),
    ).rejects.toMatchObject(DEAD);
  });

  it("works for its own purpose only", async () => {
    const { email } = await addPerson(db, ["technician"]);
    await requestPasswordLink(testDeps(db, START), visitor, { email });
    const token = await lastToken(email);
    await expect(signInWithToken(testDeps(db, START), visitor, { token })).rejects.toMatchObject(
      DEAD,
    );
    await choosePassword(testDeps(db, later(1)), visitor, { token, password: "another long word" });
  });

  it("is replaced by a newer one", async () => {
    const { email } = await addPerson(db, ["technician"]);
    await requestSignInLink(testDeps(db, START), visitor, { email });
    const first = await lastToken(email);
    await requestSignInLink(testDeps(db, later(1)), visitor, { email });
    await expect(
      signInWithToken(testDeps(db, later(2)), visitor, { token: first }),
    ).rejects.toMatchObject(DEAD);
    const token = await lastToken(email);
    await signInWithToken(testDeps(db, later(2)), visitor, { token });
  });

  it("is not kept in readable form once the mail has gone", async () => {
    const { id, email } = await addPerson(db, ["technician"]);
    await requestSignInLink(testDeps(db, START), visitor, { email });
    const token = await lastToken(email);
    const { tokenHash } = await db
      .selectFrom("oneTimeToken")
      .select("tokenHash")
      .where("personId", "=", id)
      .executeTakeFirstOrThrow();
    expect(tokenHash).not.toContain(token);
    await db
      .updateTable("outboundMail")
      .set({ state: "sent", sentAt: START })
      .where("toEmail", "=", email)
      .execute();
    expect(JSON.stringify(await mailsTo(email))).not.toContain(token);
  });

  it("stops working when the person is switched off", async () => {
    const administrator = await addPerson(db, ["administrator"]);
    const { id, email } = await addPerson(db, ["technician"]);
    await requestSignInLink(testDeps(db, START), visitor, { email });
    const token = await lastToken(email);
    await switchPerson(testDeps(db, START), administrator.actor, { personId: id, active: false });
    await switchPerson(testDeps(db, START), administrator.actor, { personId: id, active: true });
    await expect(signInWithToken(testDeps(db, START), visitor, { token })).rejects.toMatchObject(
      DEAD,
    );
  });
});

describe("asking for a link", () => {
  it("does not tell whether anybody has the address", async () => {
    const { email } = await addPerson(db, ["technician"]);
    const unknown = "nobody@quillmere.example";
    expect(await requestPasswordLink(testDeps(db), visitor, { email })).toEqual({ email });
    expect(await requestPasswordLink(testDeps(db), visitor, { email: unknown })).toEqual({
      email: unknown,
    });
    expect(await mailsTo(email)).toHaveLength(1);
    expect(await mailsTo(unknown)).toHaveLength(0);
  });

  it("is limited alike for known and unknown addresses", async () => {
    const { email } = await addPerson(db, ["technician"]);
    for (const address of [email, "stranger@quillmere.example"]) {
      const codes: unknown[] = [];
      for (let i = 0; i < 6; i += 1) {
        const error: unknown = await requestSignInLink(
          testDeps(db, later(300)),
          { kind: "visitor", origin: address },
          { email: address },
        ).then(
          () => null,
          (reason: unknown) => reason,
        );
        codes.push((error as { code?: string } | null)?.code ?? "sent");
      }
      expect(codes).toEqual([...Array(5).fill("sent"), "too_many"]);
    }
  });
});

describe("an invitation", () => {
  it("is mailed, taken up once, and leads to a sign-in with the chosen password", async () => {
    const administrator = await addPerson(db, ["administrator"]);
    const email = "Tom.Rush@quillmere.example";
    const deps = testDeps(db, START);
    await invitePerson(deps, administrator.actor, { name: "Tom", email, roles: ["technician"] });
    expect(deps.enqueued.map((job) => job.name)).toEqual(["mail"]);
    const [mail] = await mailsTo(email.toLowerCase());
    expect(mail).toMatchObject({
      template: "invitation",
      props: { name: "Tom", organisation: "Quillmere Drainage Board", locale: "en-GB" },
    });
    const token = await lastToken(email.toLowerCase());
    const choice = { token, name: "Tom Rush", password: PASSWORD };
    // Six days later it still works; the limit is seven.
    await acceptInvitation(testDeps(db, later(6 * 1440)), visitor, choice);
    await expect(
      acceptInvitation(testDeps(db, later(6 * 1440)), visitor, choice),
    ).rejects.toMatchObject(DEAD);
    const signedIn = await signInWithPassword(testDeps(db, later(6 * 1440)), visitor, {
      email,
      password: PASSWORD,
    });
    expect(signedIn.name).toBe("Tom Rush");
  });

  it("names the field when the address is taken or the password too short", async () => {
    const administrator = await addPerson(db, ["administrator"]);
    await expect(
      invitePerson(testDeps(db), administrator.actor, {
        name: "Again",
        email: administrator.email,
        roles: ["dispatcher"],
      }),
    ).rejects.toMatchObject({ code: "conflict", faults: [{ field: "email" }] });
    await expect(
      acceptInvitation(testDeps(db), visitor, { token: "x", name: "Tom", password: "short" }),
    ).rejects.toMatchObject({
      code: "invalid",
      faults: expect.arrayContaining([expect.objectContaining({ field: "password" })]),
    });
  });
});
