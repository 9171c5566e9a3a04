import { deliverMail } from "@/lib/usecases/deliver-mail";
import { judgeHistory } from "@/lib/usecases/judge-history";
import { lookForFindings } from "@/lib/usecases/look-for-findings";
import { runPlanJob } from "@/lib/usecases/run-plan-job";
import { refreshForecasts } from "@/lib/usecases/refresh-forecasts";
import { runImportApply, runImportCheck } from "@/lib/usecases/run-import";
import { sendDigests } from "@/lib/usecases/send-digests";
import type { Actor, Deps, JobName } from "@/lib/usecases/use-case";
import { env } from "./deps";
import { renewForecasts } from "./threads/renew-forecasts";

const system: Actor = { kind: "system" };

/** What the worker does for each queue. Every handler may run twice for one job. */
export const HANDLERS: Record<JobName, (deps: Deps, data: never) => Promise<unknown>> = {
  forecast: (deps, data) => refreshForecasts(deps, system, data),
  // Renewing comes last: packs that came out and shifts that were found bear on forecasts.
  "forecast-all": async (deps) => ({
    ...(await judgeHistory(deps, system, {})),
    ...(await lookForFindings(deps, system, {})),
    ...(await renewForecasts(deps, env().DATABASE_URL)),
  }),
  plan: (deps, data) => runPlanJob(deps, system, data),
  mail: (deps, data) => deliverMail(deps, system, data),
  "import-check": (deps, data) => runImportCheck(deps, system, data),
  "import-apply": (deps, data) => runImportApply(deps, system, data),
  digests: (deps) => sendDigests(deps, system, {}),
};
