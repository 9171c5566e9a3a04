import { randomBytes } from "node:crypto";
import pg from "pg";

/** A new, empty database on a server, and how to be rid of it. */
export async function throwAwayDatabase(server: string) {
  const name = `wanewright_bench_${randomBytes(4).toString("hex")}`;
  const ask = async (sql: string): Promise<void> => {
    const admin = new pg.Client({ connectionString: server });
    await admin.connect();
    try {
      await admin.query(sql);
    } finally {
      await admin.end();
    }
  };
  await ask(`create database "${name}"`);
  const address = new URL(server);
  address.pathname = `/${name}`;
  return { url: address.href, drop: () => ask(`drop database if exists "${name}" with (force)`) };
}
