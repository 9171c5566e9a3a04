import { startMailFake } from "./server";

/** MAIL_FAKE_PORT and MAIL_FAKE_FOLDER (left out: mails are kept in memory). */
const fake = await startMailFake({
  port: Number(process.env.MAIL_FAKE_PORT || 3025),
  folder: process.env.MAIL_FAKE_FOLDER || null,
});
console.log(`Mails: ${fake.address}`);
for (const signal of ["SIGINT", "SIGTERM"] as const) {
  process.on(signal, () => void fake.close().then(() => process.exit(0)));
}
