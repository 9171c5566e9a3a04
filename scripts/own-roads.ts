import { readFile } from "node:fs/promises";
import { isAppError } from "@/lib/errors";
import { deps } from "@/lib/server/deps";
import { setOwnRoads } from "@/lib/usecases/set-own-roads";

const HELP = `Sets the organisation's own roads, on which driving times are then worked out.

  npm run own-roads -- FILE.geojson

The file is GeoJSON (RFC 7946): each LineString with the properties id and kmh is a road, driven
both ways; roads meet where their ends have equal coordinates. An empty collection takes all
roads away, and driving times come from the straight line again.`;

async function main(): Promise<number> {
  const file = process.argv[2];
  if (!file || file === "--help") {
    console.log(HELP);
    return file ? 0 : 2;
  }
  try {
    const collection = JSON.parse(await readFile(file, "utf8"));
    const { roads } = await setOwnRoads(deps(), { kind: "system" }, { collection });
    console.log(`${roads} roads are in use from the next plan on.`);
    return 0;
  } catch (error) {
    if (!isAppError(error) && !(error instanceof SyntaxError)) throw error;
    console.error(`${file}: ${error.message}`);
    return 1;
  } finally {
    await deps().db.destroy();
  }
}

process.exitCode = await main();
