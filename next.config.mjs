import { dirname } from "node:path";
import { fileURLToPath } from "node:url";

/** @type {import('next').NextConfig} */
const config = {
  // Lets several builds of one checkout stand side by side (tests, development).
  distDir: process.env.WANEWRIGHT_DIST ?? ".next",
  poweredByHeader: false,
  // Pages get theirs, and the content security policy, from proxy.ts; these are for plain files.
  headers: async () => [
    { source: "/:path*", headers: [{ key: "X-Content-Type-Options", value: "nosniff" }] },
  ],
  reactStrictMode: true,
  turbopack: { root: dirname(fileURLToPath(import.meta.url)) },
  serverExternalPackages: ["pg", "pg-boss", "@node-rs/argon2", "pino", "sharp"],
};

export default config;
