import { beforeAll, describe, expect, it } from "vitest";
import { hashPassword } from "@/lib/usecases/passwords";
import { signInWithPassword } from "@/lib/usecases/sign-in-with-password";
import { testDatabase } from "@/tests/support/database";
import { testDeps } from "@/tests/support/deps";
import { addPerson, foundBoard, PASSWORD, visitor } from "./house";

const { db } = await testDatabase();
beforeAll(() => foundBoard(db));

const START = new Date("2026-12-01T09:00:00Z");
const later = (minutes: number) => new Date(START.getTime() + minutes * 60_000);
const from = (origin: string) => ({ kind: "visitor" as const, origin });
const REFUSED = "This mail address and password do not go together.";

describe("signing in with a password", () => {
  it("gives what a session is made of, and the audit says who came", async () => {
    const { id, email } = await addPerson(db, ["dispatcher"]);
    const signedIn = await signInWithPassword(testDeps(db), visitor, {
      email: ` ${email.toUpperCase()} `,
      password: PASSWORD,
    });
    expect(signedIn).toEqual({ id, name: "Ada Marsh", email, sessionVersion: 1 });
    const acts = await db
      .selectFrom("auditEntry")
      .select(["act", "personId"])
      .where("subjectId", "=", id)
      .execute();
    expect(acts).toEqual([{ act: "sign-in-with-password", personId: id }]);
  });

  it("answers a wrong password, an unknown address and a person switched off alike", async () => {
    const known = await addPerson(db, ["dispatcher"]);
    const off = await addPerson(db, ["dispatcher"]);
    await db.updateTable("person").set({ active: false }).where("id", "=", off.id).execute();
    const attempts = [
      { email: known.email, password: "something else entirely" },
      { email: "nobody@quillmere.example", password: PASSWORD },
      { email: "not an address", password: PASSWORD },
      { email: off.email, password: PASSWORD },
    ];
    for (const attempt of attempts) {
      await expect(signInWithPassword(testDeps(db), visitor, attempt)).rejects.toMatchObject({
        code: "not_signed_in",
        message: REFUSED,
      });
    }
  });

  it("takes as long for an unknown address as for a known one", async () => {
    const known = await addPerson(db, ["dispatcher"]);
    const time = async (email: string) => {
      const started = performance.now();
      await signInWithPassword(testDeps(db), from("192.0.2.40"), {
        email,
        password: "something else",
      }).catch(() => undefined);
      return performance.now() - started;
    };
    await time("warming-up@quillmere.example");
    const knownMs: number[] = [];
    const unknownMs: number[] = [];
    for (let i = 0; i < 6; i += 1) {
      knownMs.push(await time(known.email));
      unknownMs.push(await time(`nobody${i}@quillmere.example`));
    }
    // Without the decoy the unknown one takes a twentieth: the quickest of six tells them apart
    // also on a busy machine.
    expect(Math.min(...unknownMs)).toBeGreaterThan(Math.min(...knownMs) / 3);
  });

  it("hashes with the first choice of the OWASP Password Storage Cheat Sheet", async () => {
    // "Use Argon2id with a minimum configuration of 19 MiB of memory, an iteration count of 2,
    // and 1 degree of parallelism": m is in KiB, 19 * 1024 = 19456.
    expect(await hashPassword(PASSWORD)).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
  });
});

describe("the limit on failures", () => {
  const fail = (email: string, at: Date, origin: string) =>
    signInWithPassword(testDeps(db, at), from(origin), { email, password: "wrong" });

  it("stops at ten in a quarter of an hour, says when to come again, and lets in after it", async () => {
    const { email } = await addPerson(db, ["dispatcher"]);
    for (let i = 0; i < 10; i += 1) {
      await expect(fail(email, later(i), `192.0.2.${i}`)).rejects.toMatchObject({
        message: REFUSED,
      });
    }
    const right = { email, password: PASSWORD };
    await expect(
      signInWithPassword(testDeps(db, later(10)), from("198.51.100.1"), right),
    ).rejects.toMatchObject({
      code: "too_many",
      message: "Too many attempts. Try again in 5 minutes, or ask for a one-time link by mail.",
    });
    await signInWithPassword(testDeps(db, later(15.1)), from("198.51.100.1"), right);
  });

  it("does not prolong itself by knocking on", async () => {
    const { email } = await addPerson(db, ["dispatcher"]);
    for (let i = 0; i < 10; i += 1) await fail(email, START, "192.0.2.60").catch(() => undefined);
    for (let i = 1; i < 15; i += 1) {
      await expect(fail(email, later(i), "192.0.2.60")).rejects.toMatchObject({ code: "too_many" });
    }
    await signInWithPassword(testDeps(db, later(15.1)), from("192.0.2.60"), {
      email,
      password: PASSWORD,
    });
  });

  it("counts the failures of one origin over many addresses", async () => {
    const at = later(300);
    const codes: unknown[] = [];
    for (let i = 0; i < 51; i += 1) {
      const error: unknown = await fail(`guess${i}@quillmere.example`, at, "203.0.113.9").catch(
        (reason: unknown) => reason,
      );
      codes.push((error as { code?: string }).code);
    }
    expect(codes.slice(0, 50)).toEqual(Array(50).fill("not_signed_in"));
    expect(codes[50]).toBe("too_many");
  });

  it("cannot be slipped past by many at once", async () => {
    const { email } = await addPerson(db, ["dispatcher"]);
    const attempts = Array.from({ length: 30 }, (_, i) =>
      fail(email, later(600), `192.0.2.${i}`).catch((reason: unknown) => reason),
    );
    const codes = (await Promise.all(attempts)).map((error) => (error as { code?: string }).code);
    expect(codes.filter((code) => code === "not_signed_in").length).toBeLessThanOrEqual(10);
    expect(codes.filter((code) => code === "too_many").length).toBeGreaterThanOrEqual(20);
  });

  it("forgives a person's failures when they get in", async () => {
    const { email } = await addPerson(db, ["dispatcher"]);
    const at = later(900);
    for (let round = 0; round < 2; round += 1) {
      for (let i = 0; i < 8; i += 1) await fail(email, at, "192.0.2.70").catch(() => undefined);
      await signInWithPassword(testDeps(db, at), from("192.0.2.70"), { email, password: PASSWORD });
    }
  });
});
