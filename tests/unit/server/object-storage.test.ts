/**
 * The S3 SDK is the outside judge: what it puts it gets back, and its own errors are told apart. The
 * stand-in speaks as much of the protocol as the SDK needs (path style, SHA-256 of the body).
 */
import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { parseEnv } from "@/lib/env";
import { objectStorage } from "@/lib/server/object-storage";
import { type StorageFake, startStorageFake } from "../../../scripts/storage-fake/server";

const folder = mkdtempSync(join(tmpdir(), "wanewright-objects-"));
let fake: StorageFake;

beforeAll(async () => {
  fake = await startStorageFake({ port: 0, folder, accessKeyId: "the-key" });
});
afterAll(async () => {
  await fake.close();
  rmSync(folder, { recursive: true, force: true });
});

const settings = (more: object = {}) => ({
  S3_BUCKET: "bucket",
  S3_ENDPOINT: fake.address,
  S3_REGION: "us-east-1",
  S3_ACCESS_KEY_ID: "the-key",
  S3_SECRET_ACCESS_KEY: "secret",
  ...more,
});

describe("objects", () => {
  it("come back as they were put, over a restart of the stand-in", async () => {
    const bytes = new Uint8Array(Array.from({ length: 70_000 }, (_, n) => n % 251));
    await objectStorage(settings()).put("photos/a.jpg", bytes, "image/jpeg");
    await fake.close();
    fake = await startStorageFake({ port: 0, folder, accessKeyId: "the-key" });
    const found = await objectStorage(settings()).get("photos/a.jpg");
    expect(found?.bytes).toBe(70_000);
    const read = new Uint8Array(await new Response(found?.body).arrayBuffer());
    expect(Buffer.compare(read, bytes)).toBe(0);
  });

  it("that were never put are null, not an error", async () => {
    expect(await objectStorage(settings()).get("photos/none.jpg")).toBeNull();
  });

  it("are refused to another key, as something that may pass", async () => {
    const stranger = objectStorage(settings({ S3_ACCESS_KEY_ID: "another" }));
    await expect(stranger.get("photos/a.jpg")).rejects.toMatchObject({ code: "unavailable" });
  });

  it("without a bucket say what to set", async () => {
    const none = objectStorage(settings({ S3_BUCKET: undefined }));
    await expect(none.put("a", new Uint8Array(1), "image/jpeg")).rejects.toThrow("S3_BUCKET");
  });

  it("never lead out of the folder", async () => {
    const response = await fetch(`${fake.address}/bucket/..%2f..%2f..%2fetc%2fpasswd`, {
      headers: { authorization: "AWS4-HMAC-SHA256 Credential=the-key/x" },
    });
    expect(response.ok).toBe(false);
    expect(await response.text()).not.toContain("root:");
  });
});

it("half a pair of keys stops the start and names the other half", () => {
  const base = { DATABASE_URL: "postgres://a@b/c", AUTH_SECRET: "x".repeat(32) };
  expect(() => parseEnv({ ...base, S3_ACCESS_KEY_ID: "k" })).toThrow("S3_SECRET_ACCESS_KEY");
  expect(parseEnv(base).S3_BUCKET).toBeUndefined();
});
