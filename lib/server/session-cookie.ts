import { getToken } from "next-auth/jwt";

export const SESSION_DAYS = 14;

/** Cookies are marked Secure, with the prefix that browsers enforce, when the address is https. */
export function sessionIsSecure(appUrl: string): boolean {
  return appUrl.startsWith("https:");
}

/**
 * Whether the request carries a session that was signed here and has not run out. Says nothing
 * about revocation: `currentActor` asks the database that.
 */
export async function hasSignedSession(
  request: Request,
  secret: string,
  appUrl: string,
): Promise<boolean> {
  const token = await getToken({ req: request, secret, secureCookie: sessionIsSecure(appUrl) });
  return typeof token?.personId === "string";
}
