import { startStorageFake } from "./server";

/** STORAGE_FAKE_PORT, STORAGE_FAKE_FOLDER and the key that is let in, S3_ACCESS_KEY_ID. */
const fake = await startStorageFake({
  port: Number(process.env.STORAGE_FAKE_PORT || 3035),
  folder: process.env.STORAGE_FAKE_FOLDER || ".wanewright/objects",
  accessKeyId: process.env.S3_ACCESS_KEY_ID ?? "",
});
console.log(`Objects: ${fake.address}`);
for (const signal of ["SIGINT", "SIGTERM"] as const) {
  process.on(signal, () => void fake.close().then(() => process.exit(0)));
}
