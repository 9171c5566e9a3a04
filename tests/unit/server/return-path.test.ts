import { describe, expect, it } from "vitest";
import { safeReturnPath } from "@/lib/server/return-path";

// Ways to leave by a "path", from the WHATWG URL Standard (special schemes treat "\" as "/",
// tabs and newlines are dropped) and the OWASP Unvalidated Redirects Cheat Sheet.
const LEAVING = [
  "https://elsewhere.example/",
  "//elsewhere.example/",
  "/\\elsewhere.example/",
  "\\\\elsewhere.example/",
  "/\t/elsewhere.example/",
  "/\n/elsewhere.example",
  "/./\\elsewhere.example",
  "/.//elsewhere.example",
  "/x/..//elsewhere.example",
  "javascript:alert(1)",
  " /horizon",
  "horizon",
  "",
  null,
  undefined,
  ["/horizon"],
];

describe("the path after signing in", () => {
  it.each(LEAVING)("does not believe %j", (given) => {
    expect(safeReturnPath(given)).toBe("/");
  });

  it.each(["/horizon", "/fleet/QF-0417?tab=voltages", "/stop?id=1", "/rounds?week=2026-W49"])(
    "goes back to %s",
    (path) => {
      expect(safeReturnPath(path)).toBe(path);
      expect(new URL(safeReturnPath(path), "https://wanewright.example").origin).toBe(
        "https://wanewright.example",
      );
    },
  );

  it.each(["/sign-in?from=/sign-in", "/api/v1/assets", "/api"])("does not circle by %s", (path) => {
    expect(safeReturnPath(path)).toBe("/");
  });
});
