/**
 * Photos a phone may send. A photo belongs to the entry it was taken for and follows it: it is sent
 * when the server has that entry, under an id made on the phone, and kept once.
 */
import { z } from "zod";

/** The longer edge of a photo as the phone sends it, in pixels. */
export const PHOTO_EDGE_PX = 1600;
/** Far above what a phone of ours sends: whatever is larger was not made by it. */
export const MAX_PHOTO_BYTES = 8_000_000;
export const MAX_PHOTOS_AN_ENTRY = 12;

/** Where a photo was taken, WGS 84 degrees. */
export interface PhotoPosition {
  readonly latitude: number;
  readonly longitude: number;
}

export const photoRequest = z.object({
  id: z.uuid(),
  entryId: z.uuid(),
  /** Whose photo it is: another person on the same phone never sends it as theirs. */
  personId: z.uuid(),
  takenAt: z.iso.datetime(),
  /** The phone's clock when it sent. */
  sentAt: z.iso.datetime(),
  /** Left out unless the organisation's photos keep their position. */
  position: z
    .object({ latitude: z.number().min(-90).max(90), longitude: z.number().min(-180).max(180) })
    .nullable()
    .default(null),
  bytes: z.instanceof(Uint8Array),
});
export type PhotoRequest = z.output<typeof photoRequest>;
