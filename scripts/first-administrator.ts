import { parseArgs } from "node:util";
import { createInterface } from "node:readline/promises";
import { migrateToLatest } from "@/db/migrate";
import { isAppError } from "@/lib/errors";
import { deps } from "@/lib/server/deps";
import { foundOrganisation } from "@/lib/usecases/found-organisation";

const HELP = `Makes the organisation of an empty deployment and its first administrator.

  npm run first-administrator -- --email ada@example.org --name "Ada Marsh" \\
    --organisation "Example Board" --time-zone Europe/London

  --currency GBP       ISO 4217 code
  --locale en-GB       how dates and numbers are written
  --password-stdin     read the password from standard input; without it a one-time
                       link is printed, with which the administrator chooses one
The same environment variables as for the application (DATABASE_URL, AUTH_SECRET, APP_URL).`;

const OPTIONS = {
  email: { type: "string" },
  name: { type: "string" },
  organisation: { type: "string" },
  "time-zone": { type: "string" },
  currency: { type: "string", default: "GBP" },
  locale: { type: "string", default: "en-GB" },
  "password-stdin": { type: "boolean", default: false },
  help: { type: "boolean", default: false },
} as const;

/** Which option an entry of the use case came from. */
const OPTION_OF: Readonly<Record<string, string>> = { timeZone: "time-zone" };

async function main(): Promise<number> {
  const { values } = parseArgs({ options: OPTIONS });
  if (values.help) {
    console.log(HELP);
    return 0;
  }
  const { db } = deps();
  try {
    await migrateToLatest(db);
    const { url } = await foundOrganisation(
      deps(),
      { kind: "system" },
      {
        organisation: values.organisation ?? "",
        timeZone: values["time-zone"] ?? "",
        currency: values.currency,
        locale: values.locale,
        name: values.name ?? "",
        email: values.email ?? "",
        password: values["password-stdin"] ? await firstLine() : null,
      },
    );
    console.log(`${values.name} is the administrator of ${values.organisation}.`);
    console.log(
      url
        ? `Open this link once, within 7 days, to choose a password:\n${url}`
        : `Sign in with ${values.email}.`,
    );
    return 0;
  } finally {
    await db.destroy();
  }
}

async function firstLine(): Promise<string> {
  const lines = createInterface({ input: process.stdin });
  for await (const line of lines) return line;
  return "";
}

/** Says what is wrong and with which option. */
function explain(error: unknown): void {
  console.error(error instanceof Error ? error.message : String(error));
  if (!isAppError(error)) return;
  for (const { field, message } of error.faults) {
    console.error(`  --${OPTION_OF[field] ?? field}: ${message}`);
  }
  if (error.faults.length > 0) console.error(`\n${HELP}`);
}

try {
  process.exitCode = await main();
} catch (error) {
  explain(error);
  process.exitCode = 1;
}
