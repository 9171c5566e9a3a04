import { beforeAll, describe, expect, it } from "vitest";
import { actorOfSession } from "@/lib/server/session-actor";
import { changeOwnPassword } from "@/lib/usecases/change-own-password";
import { changePerson } from "@/lib/usecases/change-person";
import { signInWithPassword } from "@/lib/usecases/sign-in-with-password";
import { signOutEverywhere } from "@/lib/usecases/sign-out-everywhere";
import { switchPerson } from "@/lib/usecases/switch-person";
import { testDatabase } from "@/tests/support/database";
import { testDeps } from "@/tests/support/deps";
import { addPerson, foundBoard, PASSWORD, visitor } from "./house";

const { db } = await testDatabase();
const deps = testDeps(db);
beforeAll(() => foundBoard(db));

async function signedIn() {
  const person = await addPerson(db, ["dispatcher"]);
  const { id, sessionVersion } = await signInWithPassword(deps, visitor, {
    email: person.email,
    password: PASSWORD,
  });
  const claim = { personId: id, sessionVersion };
  expect(await actorOfSession(db, claim)).toMatchObject({ personId: id, roles: ["dispatcher"] });
  return { ...person, claim };
}

describe("a session at its next request", () => {
  it("is over when the person signed out everywhere", async () => {
    const { id, actor, claim } = await signedIn();
    await signOutEverywhere(deps, actor, { personId: id });
    expect(await actorOfSession(db, claim)).toBeNull();
  });

  it("is over when an administrator ended it or switched the person off", async () => {
    const administrator = await addPerson(db, ["administrator"]);
    const lost = await signedIn();
    await signOutEverywhere(deps, administrator.actor, { personId: lost.id });
    expect(await actorOfSession(db, lost.claim)).toBeNull();

    const off = await signedIn();
    await switchPerson(deps, administrator.actor, { personId: off.id, active: false });
    expect(await actorOfSession(db, off.claim)).toBeNull();
    // Switched on again the old session stays dead.
    await switchPerson(deps, administrator.actor, { personId: off.id, active: true });
    expect(await actorOfSession(db, off.claim)).toBeNull();
  });

  it("is over when the password changes", async () => {
    const { actor, claim } = await signedIn();
    await changeOwnPassword(deps, actor, { present: PASSWORD, password: "another long sentence" });
    expect(await actorOfSession(db, claim)).toBeNull();
  });

  it("has the new roles as soon as they change", async () => {
    const administrator = await addPerson(db, ["administrator"]);
    const { id, email, claim } = await signedIn();
    await changePerson(deps, administrator.actor, {
      personId: id,
      name: "Ada Marsh",
      email,
      roles: ["supervisor"],
    });
    expect(await actorOfSession(db, claim)).toMatchObject({ roles: ["supervisor"] });
  });
});

describe("what one person may not do to another", () => {
  it("sign them out everywhere, unless an administrator", async () => {
    const other = await signedIn();
    const { actor } = await addPerson(db, ["dispatcher", "supervisor", "technician"]);
    await expect(signOutEverywhere(deps, actor, { personId: other.id })).rejects.toMatchObject({
      code: "forbidden",
    });
    expect(await actorOfSession(db, other.claim)).not.toBeNull();
  });
});
