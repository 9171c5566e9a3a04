import { z } from "zod";
import { listCellTypeNames } from "@/db/queries/planning-fleet";
import { listClosedMatters, listOpenMatters } from "@/db/queries/field-matters";
import { listEntryPhotos } from "@/db/queries/photos";
import { getOrganisation } from "@/db/queries/organisation";
import { defineUseCase } from "./use-case";

const CLOSED_SHOWN = 30;

/** What came from the phones and needs a decision, and what was decided lately. */
export const listFieldMatters = defineUseCase({
  name: "list-field-matters",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({}),
  run: async (deps) => {
    const [organisation, open, closed, cellNames] = await Promise.all([
      getOrganisation(deps.db),
      listOpenMatters(deps.db),
      listClosedMatters(deps.db, CLOSED_SHOWN),
      listCellTypeNames(deps.db),
    ]);
    const rows = await listEntryPhotos(
      deps.db,
      open.map((matter) => matter.entryId),
    );
    const photos = new Map<string, { id: string; label: string }[]>();
    for (const { id, entryId } of rows) {
      const own = photos.get(entryId) ?? [];
      photos.set(entryId, [...own, { id, label: `Photo ${own.length + 1}` }]);
    }
    return { organisation, open, closed, cellNames, photos };
  },
});
export type FieldMatters = Awaited<ReturnType<typeof listFieldMatters>>;
export type FieldMatter = FieldMatters["open"][number];
