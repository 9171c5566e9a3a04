/** Lets a worker thread read TypeScript: on Node 20 `--import tsx` reaches the main thread alone. */
import { register } from "tsx/esm/api";

register();
await import("./renewal-thread.ts");
