import { z } from "zod";
import { listApiKeys as query } from "@/db/queries/api-keys";
import { defineUseCase } from "./use-case";

/** The API keys, without their secrets: those are shown once and never stored. */
export const listApiKeys = defineUseCase({
  name: "list-api-keys",
  allow: { roles: ["administrator"] },
  input: z.object({}),
  run: (deps) => query(deps.db),
});

export type ApiKeyRow = Awaited<ReturnType<typeof listApiKeys>>[number];
