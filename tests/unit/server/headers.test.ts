import { describe, expect, it } from "vitest";
import { contentSecurityPolicy, securityHeaders } from "@/lib/server/headers";
import { originOf } from "@/lib/server/origin";
import { originOfTemplate } from "@/lib/server/tile-origin";

// Directives as the W3C's Content Security Policy Level 3 names them.
const policyOf = (more: Partial<Parameters<typeof contentSecurityPolicy>[0]> = {}) => {
  const text = contentSecurityPolicy({
    ...{ nonce: "abc", secure: true, development: false, tileOrigin: null, ...more },
  });
  return new Map(
    text.split("; ").map((rule): [string, string[]] => {
      const [name = "", ...sources] = rule.split(" ");
      return [name, sources];
    }),
  );
};

describe("the content security policy", () => {
  it("lets no script run without the nonce", () => {
    const scripts = policyOf().get("script-src");
    expect(scripts).toContain("'nonce-abc'");
    expect(scripts).not.toContain("'unsafe-inline'");
    expect(scripts).not.toContain("'unsafe-eval'");
  });

  it("lets no style element in without the nonce, and nobody frame a page", () => {
    const policy = policyOf();
    expect(policy.get("style-src")).toEqual(["'self'", "'nonce-abc'"]);
    expect(policy.get("frame-ancestors")).toEqual(["'none'"]);
    expect(policy.get("object-src")).toEqual(["'none'"]);
    expect(policy.get("base-uri")).toEqual(["'none'"]);
    expect(policy.get("form-action")).toEqual(["'self'"]);
  });

  it("fetches images from the configured tiles and from nowhere else", () => {
    expect(policyOf().get("img-src")).toEqual(["'self'", "data:", "blob:"]);
    const tileOrigin = originOfTemplate("https://{s}.tiles.example:8443/{z}/{x}/{y}.png");
    expect(policyOf({ tileOrigin }).get("img-src")).toContain("https://*.tiles.example:8443");
  });

  it("asks for https only where the application is served by it", () => {
    expect(policyOf().has("upgrade-insecure-requests")).toBe(true);
    expect(policyOf({ secure: false }).has("upgrade-insecure-requests")).toBe(false);
    expect(securityHeaders(false)).not.toHaveProperty("Strict-Transport-Security");
    // RFC 6797, section 6.1.1: max-age in seconds; a year here.
    expect(securityHeaders(true)["Strict-Transport-Security"]).toMatch(/^max-age=31536000/);
  });
});

describe("the origin of the tiles", () => {
  it.each([
    ["https://tiles.example/{z}/{x}/{y}.png", "https://tiles.example"],
    ["http://127.0.0.1:9000/{z}/{x}/{y}", "http://127.0.0.1:9000"],
    ["https://tiles.example; script-src *", null],
    ["https://tiles.example 'unsafe-inline'", null],
    ["data:text/html,x", null],
    [null, null],
  ])("of %j is %j", (template, origin) => {
    expect(originOfTemplate(template)).toBe(origin);
  });
});

describe("the address that attempts are counted under", () => {
  it("is what the nearest proxy saw, whatever the client claims", () => {
    expect(originOf(new Headers({ "x-forwarded-for": "198.51.100.1, 203.0.113.5" }))).toBe(
      "203.0.113.5",
    );
    expect(originOf(new Headers())).toBe("local");
  });
});
