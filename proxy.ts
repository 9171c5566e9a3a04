import { type NextRequest, NextResponse } from "next/server";
import { env } from "@/lib/server/deps";
import { contentSecurityPolicy, isDevelopment, securityHeaders } from "@/lib/server/headers";
import { PATH_HEADER } from "@/lib/server/path-header";
import { hasSignedSession, sessionIsSecure } from "@/lib/server/session-cookie";
import { tileOrigin } from "@/lib/server/tile-origin";

/** What a visitor may open. */
const OPEN = /^\/(sign-in|forgotten|welcome|api\/health)(\/|$)/;

/**
 * Runs before every page and API route: headers, and a first look at the session. It only
 * spares a visitor a page that would refuse them; the use cases decide who may do what.
 */
export async function proxy(request: NextRequest): Promise<NextResponse> {
  const { AUTH_SECRET, APP_URL } = env();
  const secure = sessionIsSecure(APP_URL);
  const nonce = btoa(crypto.randomUUID());
  const policy = contentSecurityPolicy({
    nonce,
    secure,
    development: isDevelopment(),
    tileOrigin: await tileOrigin(),
  });
  const response =
    (await turnedAway(request, AUTH_SECRET, APP_URL)) || passOn(request, { nonce, policy });
  response.headers.set("Content-Security-Policy", policy);
  for (const [name, value] of Object.entries(securityHeaders(secure))) {
    response.headers.set(name, value);
  }
  return response;
}

/** @returns the answer that stops a visitor, or null when the request may go on */
async function turnedAway(
  request: NextRequest,
  secret: string,
  appUrl: string,
): Promise<NextResponse | null> {
  const { pathname, search } = request.nextUrl;
  if (OPEN.test(pathname)) return null;
  const api = pathname.startsWith("/api/");
  if (api && request.headers.has("authorization")) return null;
  // A form sent after the session ran out must reach its action: it answers with what was typed.
  if (!api && request.headers.has("next-action")) return null;
  if (await hasSignedSession(request, secret, appUrl)) return null;
  if (api) {
    const error = { code: "not_signed_in", message: "Please sign in.", faults: [] };
    const headers = {
      "cache-control": "no-store",
      "www-authenticate": 'Bearer realm="wanewright"',
    };
    return NextResponse.json({ error }, { status: 401, headers });
  }
  const target = new URL("/sign-in", request.url);
  if (pathname !== "/") target.searchParams.set("from", `${pathname}${search}`);
  return NextResponse.redirect(target);
}

function passOn(request: NextRequest, page: { nonce: string; policy: string }): NextResponse {
  const headers = new Headers(request.headers);
  headers.set("x-nonce", page.nonce);
  // Next reads the nonce for its own scripts from here.
  headers.set("Content-Security-Policy", page.policy);
  headers.set(PATH_HEADER, `${request.nextUrl.pathname}${request.nextUrl.search}`);
  return NextResponse.next({ request: { headers } });
}

export const config = {
  matcher: [
    // Not: sign-in's own routes, built files, and files of public/ (they have an extension).
    { source: "/((?!api/auth/|_next/|[^/]*\\.[a-z0-9]+$|(?:icons|geo|fonts)/).*)" },
  ],
};
