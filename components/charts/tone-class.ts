import type { Tone } from "@/lib/present/tone";

/** Whole class names, since Tailwind only keeps those that it can read in the source. */
export const toneStroke: Record<Tone, string> = {
  order: "stroke-spruce-line",
  soon: "stroke-honey-line",
  out: "stroke-brick-line",
  visit: "stroke-dusk-line",
  quiet: "stroke-soft",
};

export const toneFill: Record<Tone, string> = {
  order: "fill-spruce",
  soon: "fill-honey",
  out: "fill-brick",
  visit: "fill-dusk",
  quiet: "fill-soft",
};

export const toneTint: Record<Tone, string> = {
  order: "fill-spruce-tint",
  soon: "fill-honey-tint",
  out: "fill-brick-tint",
  visit: "fill-dusk-tint",
  quiet: "fill-hair",
};

export const toneText: Record<Tone, string> = {
  order: "text-ink",
  soon: "text-honey-ink",
  out: "text-brick-ink",
  visit: "text-dusk-ink",
  quiet: "text-soft",
};
