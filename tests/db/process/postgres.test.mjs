import { spawn } from "node:child_process";
import { once } from "node:events";
import { chmodSync, chownSync, existsSync, mkdtempSync, rmSync, statSync } from "node:fs";
import { truncateSync, writeFileSync } from "node:fs";
import { createServer } from "node:net";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { ensureDatabase, newPassword, startPostgres } from "../../../scripts/process/postgres.mjs";
import { runningServer } from "../../../scripts/process/postgres-lock.mjs";

/**
 * On the real server programs. What a healthy server does is PostgreSQL's own manual
 * (https://www.postgresql.org/docs/15/app-pg-ctl.html, .../storage-file-layout.html).
 */
const folder = mkdtempSync(join(tmpdir(), "wanewright-process-"));
chmodSync(folder, 0o711);
const place = { home: join(folder, "postgres"), password: newPassword() };
const cluster = join(place.home, "cluster");
const options = { firstPort: 54_700, losable: true };
/** @type {import("../../../scripts/process/postgres.mjs").Server} */
let server;

beforeAll(async () => {
  server = await startPostgres(place, options);
}, 60_000);
afterAll(async () => {
  await server.stop("immediate");
  rmSync(folder, { recursive: true, force: true });
});

/** Stops the server, does something to its folder, tells what a start says then. */
async function startAfter(/** @type {() => unknown} */ harm) {
  await server.stop();
  await harm();
  try {
    server = await startPostgres(place, options);
    return undefined;
  } catch (error) {
    return /** @type {{ name: string, message: string, mend: string }} */ (error);
  }
}

describe("a server of our own", () => {
  it("asks for the password and listens on the loopback interface only", async () => {
    expect(await server.query("show password_encryption")).toBe("scram-sha-256");
    expect(await server.query("show listen_addresses")).toBe("127.0.0.1");
    expect(await server.query("show unix_socket_directories")).toBe("");
    const wrong = { ...place, password: "wrong" };
    const stranger = await startPostgres(wrong, options); // taken over, still running
    await expect(stranger.query("select 1")).rejects.toThrow("password authentication failed");
  });

  it("keeps its folder to itself", () => {
    expect(statSync(cluster).mode & 0o077).toBe(0);
    expect(existsSync(join(place.home, "password.once"))).toBe(false);
  });

  it("is taken over while it runs, not started twice", async () => {
    const again = await startPostgres(place, options);
    expect(again).toMatchObject({ adopted: true, port: server.port });
  });

  it("keeps the data over a stop and a start", async () => {
    expect(await ensureDatabase(server, "kept")).toBe(true);
    await server.query("create table t as select 42 as x", "kept");
    expect(await startAfter(() => {})).toBeUndefined();
    expect(await server.query("select x from t", "kept")).toBe("42");
    expect(await ensureDatabase(server, "kept")).toBe(false);
  });

  it("comes back from a hard kill, and from a lock that names another process", async () => {
    const pid = runningServer(cluster)?.pid ?? 0;
    process.kill(pid, "SIGKILL");
    while (runningServer(cluster)) await new Promise((resolve) => setTimeout(resolve, 50));
    // A new container gives old numbers to others: here, to this very process.
    writeFileSync(join(cluster, "postmaster.pid"), `${process.pid}\n${cluster}\n1\n54700\n\n\n\n`);
    server = await startPostgres(place, options);
    expect(await server.query("select x from t", "kept")).toBe("42");
  });

  it("takes the next port when another program has the first", async () => {
    const firstPort = server.port;
    await server.stop();
    const other = createServer().listen(firstPort, "127.0.0.1");
    await once(other, "listening");
    server = await startPostgres(place, { ...options, firstPort });
    expect(server.port).toBeGreaterThan(firstPort);
    other.close();
  });
});

describe("a database folder that is broken", () => {
  const said = { name: "Trouble" };

  it("without its settings: names the folder and what to do", async () => {
    const file = join(cluster, "postgresql.conf");
    const error = await startAfter(() => writeFileSync(file, "this is not a setting\n"));
    expect(error).toMatchObject(said);
    expect(error?.message).toContain("postgresql.conf");
    expect(error?.mend).toContain("server.log");
    writeFileSync(file, "");
  });

  it("with a write-ahead log that is gone", async () => {
    const error = await startAfter(() => rmSync(join(cluster, "pg_wal"), { recursive: true }));
    expect(error).toMatchObject(said);
    expect(error?.message).toContain("broken");
    expect(error?.mend).toContain("backup");
  });

  it("with a control file that is empty", async () => {
    const error = await startAfter(() => truncateSync(join(cluster, "global/pg_control"), 0));
    expect(error).toMatchObject(said);
    expect(error?.message).toContain("broken");
  });

  it("without its version", async () => {
    const error = await startAfter(() => rmSync(join(cluster, "PG_VERSION")));
    expect(error).toMatchObject(said);
    expect(error?.message).toContain("which version made it");
  });

  it("made by a version that is not installed", async () => {
    const error = await startAfter(() => writeFileSync(join(cluster, "PG_VERSION"), "9\n"));
    expect(error?.message).toContain("made by PostgreSQL 9");
    expect(error?.mend).toContain("postgresql-9");
  });
});

describe("a folder that others own", () => {
  it.runIf(process.getuid?.() === 0)("is named, with the command that gives it back", async () => {
    const home = join(folder, "foreign");
    const foreign = { home, password: newPassword() };
    const first = await startPostgres(foreign, { ...options, firstPort: 54_800 });
    await first.stop("immediate");
    chownSync(join(home, "cluster"), 0, 0);
    const error = await startPostgres(foreign, options).catch((given) => given);
    expect(error).toMatchObject({ name: "Trouble" });
    expect(error.mend).toContain("chown");
  });
});

describe("a full disk", () => {
  it.runIf(process.getuid?.() === 0)("is named when the cluster is made", async (context) => {
    const home = mkdtempSync(join(folder, "small-"));
    const mount = spawn("mount", ["-t", "tmpfs", "-o", "size=8m", "tmpfs", home]);
    const [code] = await once(mount, "exit");
    if (code !== 0) return context.skip("no right to mount in this container");
    try {
      const error = await startPostgres({ home, password: "x" }, options).catch((given) => given);
      expect(error).toMatchObject({ name: "Trouble" });
      expect(error.message).toContain("disk is full");
    } finally {
      await once(spawn("umount", ["-l", home]), "exit");
    }
  });
});
