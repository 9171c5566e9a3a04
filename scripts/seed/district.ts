/** Draws the invented district anew: `npx tsx scripts/seed/district.ts` writes public/district.geojson. */
import { writeFile } from "node:fs/promises";
import { drawDistrict } from "../simulate/scenario/district";
import { districtGeoJson } from "../simulate/scenario/district-geojson";

const target = new URL("../../public/district.geojson", import.meta.url);
const { type, features } = districtGeoJson(drawDistrict());
const lines = features.map((feature) => JSON.stringify(feature)).join(",\n");
await writeFile(target, `{"type":"${type}","features":[\n${lines}\n]}\n`);
process.stdout.write(`public/district.geojson: ${features.length} features\n`);
