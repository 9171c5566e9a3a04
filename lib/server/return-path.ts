const HERE = "http://here.invalid";

/**
 * Where to go after signing in: only a path of this application is believed, so that a link
 * cannot send somebody elsewhere.
 * @param fallback what else to answer; "/" sends each role to its first page
 */
export function safeReturnPath(given: unknown, fallback = "/"): string {
  if (typeof given !== "string" || !/^\/(?![/\\])/.test(given) || given.length > 2000) {
    return fallback;
  }
  if (!URL.canParse(given, HERE)) return fallback;
  const url = new URL(given, HERE);
  const path = `${url.pathname}${url.search}`;
  // A path that normalises to "//host" would leave after all.
  if (url.origin !== HERE || path.startsWith("//")) return fallback;
  return /^\/(sign-in|api)(\/|$|\?)/.test(path) ? fallback : path;
}
