import { z } from "zod";
import { listDeviceModels as query } from "@/db/queries/device-models";
import { getOrganisation } from "@/db/queries/organisation";
import { defineUseCase } from "./use-case";

/** All device models with their duty cycles. */
export const listDeviceModels = defineUseCase({
  name: "list-device-models",
  allow: { roles: ["administrator", "dispatcher", "supervisor"], apiScope: "register:read" },
  input: z.object({}),
  run: async (deps) => ({
    organisation: await getOrganisation(deps.db),
    rows: await query(deps.db),
  }),
});

export type DeviceModelListView = Awaited<ReturnType<typeof listDeviceModels>>;
