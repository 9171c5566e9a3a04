/** `npm run doctor`: what is missing on this machine, and how to mend it. Changes nothing. */
import { examine } from "./process/doctor.mjs";

process.exitCode = await examine((line) => console.log(line));
