import { dirname } from "node:path";
import { fileURLToPath } from "node:url";

/** @type {import('next').NextConfig} */
const config = {
  // Lets several builds of one checkout stand side by side (tests, development).
  distDir: process.env.WANEWRIGHT_DIST ?? ".next",
  poweredByHeader: false,
  reactStrictMode: true,
  turbopack: { root: dirname(fileURLToPath(import.meta.url)) },
  serverExternalPackages: ["pg", "pg-boss", "@node-rs/argon2", "pino", "sharp"],
};

export default config;
