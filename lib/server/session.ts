import { createHash } from "node:crypto";
import { headers } from "next/headers";
import { redirect } from "next/navigation";
import { cache } from "react";
import { findUsableApiKey } from "@/db/queries/api-keys";
import { AppError } from "@/lib/errors";
import type { Actor, PersonActor, VisitorActor } from "@/lib/usecases/use-case";
import { auth } from "./auth";
import { deps } from "./deps";
import { originOf } from "./origin";
import { PATH_HEADER } from "./path-header";
import { safeReturnPath } from "./return-path";
import { actorOfSession } from "./session-actor";

/**
 * Who is signed in, checked against the database on every request: a token alone
 * cannot be revoked, so it carries the session version that the person row must still have.
 */
export const currentActor = cache(async (): Promise<PersonActor | null> => {
  const session = await auth();
  return session?.personId ? actorOfSession(deps().db, session) : null;
});

/** For pages: sends a visitor to the sign-in page, and back here afterwards. */
export async function requireActor(): Promise<PersonActor> {
  return (await currentActor()) ?? redirect(await signInPath());
}

async function signInPath(): Promise<string> {
  const from = safeReturnPath((await headers()).get(PATH_HEADER));
  return from === "/" ? "/sign-in" : `/sign-in?from=${encodeURIComponent(from)}`;
}

/** For the pages and actions that need no sign-in. */
export async function visitor(): Promise<VisitorActor> {
  return { kind: "visitor", origin: originOf(await headers()) };
}

/** For routes: an API key in the Authorization header, or the session cookie. */
export async function actorOfRequest(request: Request): Promise<Actor> {
  const header = request.headers.get("authorization");
  if (header) return actorOfKey(header);
  return (await currentActor()) ?? { kind: "visitor", origin: originOf(request.headers) };
}

async function actorOfKey(header: string): Promise<Actor> {
  const secret = /^Bearer (\S+)$/.exec(header)?.[1];
  const hash = secret && createHash("sha256").update(secret).digest("hex");
  const key = hash ? await findUsableApiKey(deps().db, hash, deps().now()) : null;
  if (!key) throw new AppError("not_signed_in", "This API key is unknown or was revoked.");
  return { kind: "api-key", apiKeyId: key.id, scopes: key.scopes };
}
