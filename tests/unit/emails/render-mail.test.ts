import { describe, expect, it } from "vitest";
import { previewDigest, previewLink, previewRound, previewVisit } from "@/emails/preview-data";
import { renderMail } from "@/emails/render-mail";

describe("mails", () => {
  const cases = [
    ["invitation", previewLink, previewLink.url],
    ["password", previewLink, previewLink.url],
    ["sign-in-link", previewLink, previewLink.url],
    ["round-published", previewRound, "Swap QF-0417 Level gauge: 2 × LR20"],
    ["round-changed", { ...previewRound, changes: ["Stop 2 is new."] }, "Stop 2 is new."],
    ["round-cancelled", previewRound, "will not take place"],
    ["due-digest", previewDigest, "QF-0981"],
    ["visit-notice", previewVisit, "at about 09:20"],
  ] as const;

  it.each(cases)("%s says the same in HTML and in plain text", async (name, props, said) => {
    const { html, text } = await renderMail(name, props);
    expect(html).toContain('lang="en-GB"');
    expect(html).not.toMatch(/<(script|img|link)\b/);
    expect(text).toContain(said);
    expect(text).not.toMatch(/undefined|NaN|Invalid/);
  });

  it("writes times in the organisation's zone: 08:35 UTC is 08:35 in a London winter", async () => {
    const winter = await renderMail("round-published", previewRound);
    expect(winter.text).toContain("08:35");
    const berlin = await renderMail("round-published", {
      ...previewRound,
      timeZone: "Europe/Berlin",
    });
    expect(berlin.text).toContain("09:35");
  });

  it("escapes what people typed", async () => {
    const props = { ...previewLink, name: '<img src=x onerror="alert(1)">' };
    const { html } = await renderMail("invitation", props);
    expect(html).not.toContain("<img");
  });

  it("refuses an unknown template by name", async () => {
    await expect(renderMail("nonsense", {})).rejects.toThrow('no mail template "nonsense"');
  });
});
