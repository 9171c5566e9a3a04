import { ensureDatabase, startPostgres } from "./postgres.mjs";
import { Trouble } from "./trouble.mjs";

/** The development server: one a machine, its password no secret, its data may be lost. */
const HOME = "/var/tmp/wanewright-dev-pg";
const PORT = 5544;
const PASSWORD = "app";

/**
 * Starts the development server, or finds it running. It stays up when the caller ends.
 * @param {(line: string) => void} say
 */
export async function startDevelopmentDatabase(say) {
  const place = { home: HOME, password: PASSWORD };
  const server = await startPostgres(place, { firstPort: PORT, losable: true, say });
  if (server.port !== PORT) {
    if (!server.adopted) await server.stop();
    throw new Trouble(
      `Port ${PORT} is taken by another program.`,
      `Stop it (\`ss -ltnp | grep ${PORT}\` names it), then try again.`,
    );
  }
  await ensureDatabase(server, "dev");
  return server;
}
