/** One thread of the nightly renewal: forecasts the packs of each page and stores them. */
import { randomUUID } from "node:crypto";
import { workerData } from "node:worker_threads";
import { connect } from "@/db/client";
import { refreshForecasts } from "@/lib/usecases/refresh-forecasts";
import type { Deps } from "@/lib/usecases/use-case";
import { answerPages } from "./answer-pages";
import type { RenewalData } from "./renew-forecasts";

const { url, at } = workerData as RenewalData;

const refuse = (): never => {
  throw new Error("A renewal sends and enqueues nothing.");
};
const deps: Deps = {
  db: connect(url, { max: 3, applicationName: "wanewright-renewal" }),
  now: () => (at === null ? new Date() : new Date(at)),
  newId: randomUUID,
  jobs: { enqueue: refuse },
  mailer: { send: refuse },
  appUrl: "",
};

answerPages(async (packIds) => {
  const done = await refreshForecasts(deps, { kind: "system" }, { packIds: [...packIds] });
  return done.refreshed;
});
