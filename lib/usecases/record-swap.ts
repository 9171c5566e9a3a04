import { z } from "zod";
import { getOrganisation } from "@/db/queries/organisation";
import { REASONS_OUT } from "@/db/queries/packs";
import { invalid } from "@/lib/errors";
import {
  optionalDay,
  optionalId,
  optionalScaledEntry,
  optionalTextEntry,
  requiredId,
} from "./form-entries";
import { localInstant } from "./local-instant";
import { MAX_PACK_MV } from "./record-reading";
import { type SwapResult, swapPack } from "./swap-pack";
import { defineUseCase, personIdOf } from "./use-case";

/** What every form that takes a pack out asks. */
export const packOutEntries = {
  assetId: z.uuid(),
  at: z.string().trim().min(1, "Enter when it was done."),
  /** The pack the person saw; another one there means somebody was quicker. */
  oldPackId: z.uuid(),
  reason: z.enum(REASONS_OUT, "Choose why it came out."),
  voltageOut: optionalScaledEntry(3, {
    min: 0,
    max: MAX_PACK_MV,
    wanted: "the voltage out in V, or leave it empty",
  }),
  /** When the device stopped, if it was found stopped. */
  stoppedAt: optionalTextEntry(40),
  look: optionalTextEntry(),
};

/** What every form that puts a pack in asks. */
export const packInEntries = {
  /** The client's id of the new pack. */
  packId: z.uuid(),
  cellTypeId: requiredId,
  lotId: optionalId,
  madeOn: optionalDay,
  fromPlaceId: optionalId,
};

/** Records a swap from the office; the phone's goes through `swapPack` as well. */
export const recordSwap = defineUseCase({
  name: "record-swap",
  allow: { roles: ["administrator", "dispatcher", "technician"] },
  input: z.object({ ...packOutEntries, ...packInEntries }),
  run: async (deps, actor, given): Promise<SwapResult> => {
    const { timeZone } = await getOrganisation(deps.db);
    const at = localInstant(given.at, timeZone, "at");
    const { packId, cellTypeId, lotId, madeOn, fromPlaceId } = given;
    const order = {
      assetId: given.assetId,
      at,
      personId: personIdOf(actor),
      out: readPackOut(given, at, timeZone),
      in: { id: packId, cellTypeId, lotId, madeOn, fromPlaceId },
    };
    return deps.db.transaction().execute((trx) => swapPack(trx, deps, order));
  },
});

type PackOutEntries = z.output<z.ZodObject<typeof packOutEntries>>;

/** @throws AppError invalid when the device is said to be found stopped and no day is given */
export function readPackOut(given: PackOutEntries, at: Date, timeZone: string) {
  const stopped = given.stoppedAt ? localInstant(given.stoppedAt, timeZone, "stoppedAt") : null;
  if (given.reason === "found_stopped" && !stopped) {
    const message = "Enter when it stopped, or the day you found it.";
    throw invalid(message, [{ field: "stoppedAt", message }]);
  }
  return {
    packId: given.oldPackId,
    reason: given.reason,
    voltageMv: given.voltageOut,
    stoppedAt: stopped && stopped > at ? at : stopped,
    look: given.look,
  };
}
