import { startDevelopmentDatabase } from "./process/development-database.mjs";
import { printTrouble } from "./process/trouble.mjs";
try {
  const server = await startDevelopmentDatabase((line) => console.log(line));
  console.log(`${server.adopted ? "Already running" : "Started"}: ${server.url("dev")}`);
} catch (error) {
  printTrouble(error, "starting the development database");
  process.exitCode = 1;
}
