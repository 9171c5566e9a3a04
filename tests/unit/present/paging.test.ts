import { describe, expect, it } from "vitest";
import { afterKey, ERASE } from "@/lib/present/keypad-entry";
import { hrefWith, pagesToOffer, pageSummary } from "@/lib/present/paging";

describe("paging", () => {
  it("offers the ends and the neighbours", () => {
    expect(pagesToOffer(1, 1)).toEqual([1]);
    expect(pagesToOffer(3, 13)).toEqual([1, 2, 3, 4, null, 13]);
    expect(pagesToOffer(13, 13)).toEqual([1, null, 12, 13]);
  });
  it("says which rows are shown", () => {
    expect(pageSummary(2, 100, 1284, "assets", "en-GB")).toBe("101–200 of 1,284 assets");
    expect(pageSummary(13, 100, 1284, "assets", "de-DE")).toBe("1.201–1.284 of 1.284 assets");
    expect(pageSummary(1, 100, 0, "assets", "en-GB")).toBe("no assets");
  });
  it("changes an address and starts again at the first page", () => {
    const now = { q: "P-14 & co", crew: ["north", "south"], page: "4" };
    expect(hrefWith("/fleet", now, { sort: "tag" })).toBe(
      "/fleet?q=P-14+%26+co&crew=north&crew=south&sort=tag",
    );
    expect(hrefWith("/fleet", now, { page: 5 })).toContain("page=5");
    expect(hrefWith("/fleet", now, { q: null, crew: null })).toBe("/fleet");
  });
});

describe("keypad entry", () => {
  const type = (keys: string, sign: "." | "," = ".") =>
    [...keys].reduce((value, key) => afterKey(value, key, sign, 3), "");
  it("takes a voltage as it is typed", () => {
    expect(type("3.48")).toBe("3.48");
    expect(type("12,61", ",")).toBe("12,61");
    expect(type(".9")).toBe("0.9");
  });
  it("ignores keys that would make nonsense", () => {
    expect(type("3.4.8")).toBe("3.48");
    expect(type("3.45678")).toBe("3.456");
    expect(type("12345")).toBe("123");
    expect(type("003")).toBe("3");
    expect(afterKey("3.4", ERASE, ".", 3)).toBe("3.");
    expect(afterKey("", ERASE, ".", 3)).toBe("");
  });
});
