import type { Field } from "./field";

/** How many packs are to be nearly out, and how many out, at the end. */
export interface EndState {
  readonly due: number;
  readonly out: number;
}

/** Silences of the last days before the end may still be waiting for a visit. */
const WAITING_DAYS = 7;
/** Up to this many days before the end nothing is swapped for the sake of the end state. */
const STEERED_DAYS = 30;

/**
 * Keeps the state at the moment `end` within what a demonstration needs: about `due` packs
 * that will stop within two weeks and a handful that are out. Crews let those packs be; where
 * the dice give more than that, the crews happen to swap the others early in the last weeks.
 * Before then nothing is swapped for this; the habits of the last months only spare a few.
 */
export function steer(field: Field, day: number, end: number, keep: EndState): void {
  const soon: string[] = [];
  const out: string[] = [];
  for (const tag of field.log.installed.keys()) {
    const stop = field.world.lookAhead(tag, end + 14 - day);
    if (stop === null || field.swapSoon.has(tag)) continue;
    if (stop > end + 0.2) soon.push(tag);
    else if (stop > end - WAITING_DAYS) out.push(tag);
  }
  const choosing = end - day <= STEERED_DAYS;
  for (const [tags, most] of [
    [soon, keep.due],
    [out, keep.out],
  ] as const) {
    const kept = tags.filter((tag) => field.letBe.has(tag) && choosing);
    const others = field.rng.shuffle(tags.filter((tag) => !kept.includes(tag)));
    [...kept, ...others].forEach((tag, i) => {
      if (i < most || !choosing) field.letBe.add(tag);
      else {
        field.letBe.delete(tag);
        field.swapSoon.add(tag);
      }
    });
  }
  if (choosing) for (const tag of out) if (field.letBe.has(tag)) field.keptWaiting.add(tag);
}
