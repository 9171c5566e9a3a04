/** Bodies as the Fetch standard makes them: announced by Content-Length, or streamed without. */
import { describe, expect, it } from "vitest";
import { jsonBody, withinLimit } from "@/lib/server/request-body";

const ADDRESS = "http://localhost/api/v1/readings";

function streamed(chunks: readonly string[]): Request {
  const body = new ReadableStream<Uint8Array>({
    start(controller) {
      for (const chunk of chunks) controller.enqueue(new TextEncoder().encode(chunk));
      controller.close();
    },
  });
  return new Request(ADDRESS, { method: "POST", body, duplex: "half" } as RequestInit);
}

describe("a body within its limit", () => {
  it("is read as it was sent, in one piece or many", async () => {
    const whole = new Request(ADDRESS, { method: "POST", body: '{"a":[1,2]}' });
    expect(await jsonBody(withinLimit(whole, 11))).toEqual({ a: [1, 2] });
    const pieces = streamed(['{"a":', "[1,", "2]}"]);
    expect(await jsonBody(withinLimit(pieces, 11))).toEqual({ a: [1, 2] });
  });

  it("keeps method, address and headers", () => {
    const headers = { authorization: "Bearer x" };
    const sent = withinLimit(new Request(ADDRESS, { method: "POST", body: "{}", headers }), 10);
    expect([sent.method, sent.url]).toEqual(["POST", ADDRESS]);
    expect(sent.headers.get("authorization")).toBe("Bearer x");
  });
});

describe("a body past its limit", () => {
  const tooLarge = { code: "too_large", faults: [{ field: "body" }] };

  it("is refused before it is read, when its length is announced", () => {
    const headers = { "content-length": "12" };
    const sent = new Request(ADDRESS, { method: "POST", body: '{"a":[1,2,3]}', headers });
    expect(() => withinLimit(sent, 11)).toThrow(expect.objectContaining({ code: "too_large" }));
  });

  it("is refused while it comes in, when its length is not announced", async () => {
    const reading = jsonBody(withinLimit(streamed(['{"a":', "[1,", "2,3]}"]), 11));
    await expect(reading).rejects.toMatchObject(tooLarge);
  });
});

describe("a body that is no JSON", () => {
  it("is malformed, and the sign at which it ends to be JSON is named", async () => {
    const sent = withinLimit(streamed(['{"readings": [}']), 100);
    const fault = { field: "body", message: expect.stringContaining("Unexpected token '}'") };
    await expect(jsonBody(sent)).rejects.toMatchObject({ code: "malformed", faults: [fault] });
  });
});
