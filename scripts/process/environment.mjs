/**
 * The environment of the web and worker processes: what the person set wins, the rest is
 * filled in for a start on this machine.
 * @param {NodeJS.ProcessEnv} given
 * @param {object} found
 * @param {string} found.databaseUrl
 * @param {string} found.authSecret
 * @param {number} found.port
 * @param {string | undefined} found.mailAddress of the mail fake, when it runs
 * @param {string | undefined} [found.storageAddress] of the storage fake, when it runs
 * @returns {NodeJS.ProcessEnv}
 */
export function childEnvironment(given, found) {
  const { databaseUrl, authSecret, port, mailAddress, storageAddress } = found;
  const address = given.APP_URL || `http://localhost:${port}`;
  return {
    ...given,
    NODE_ENV: "production",
    NEXT_TELEMETRY_DISABLED: "1",
    DATABASE_URL: databaseUrl,
    AUTH_SECRET: given.AUTH_SECRET || authSecret,
    APP_URL: address,
    // next-auth takes its callback host from here, not from the address it is bound to.
    AUTH_URL: given.AUTH_URL || address,
    PORT: String(port),
    ...(mailAddress && { RESEND_API_KEY: "re_local_fake", RESEND_BASE_URL: mailAddress }),
    ...(storageAddress && fakeStorage(storageAddress)),
  };
}

/** @param {string} address */
function fakeStorage(address) {
  return {
    S3_BUCKET: "wanewright",
    S3_ENDPOINT: address,
    S3_REGION: "us-east-1",
    S3_ACCESS_KEY_ID: "local-fake",
    S3_SECRET_ACCESS_KEY: "local-fake",
  };
}
