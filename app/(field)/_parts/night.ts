const KEY = "wanewright-night";

export const NIGHT_WORDS = { phone: "as the phone", on: "on", off: "off" } as const;
export type Night = keyof typeof NIGHT_WORDS;
export const afterNight: Readonly<Record<Night, Night>> = { phone: "on", on: "off", off: "phone" };

export function keptNight(): Night {
  const kept = localStorage.getItem(KEY);
  return kept === "on" || kept === "off" ? kept : "phone";
}

/** Puts the kept choice on the page. */
export function showNight(): void {
  const { dataset } = document.documentElement;
  const night = keptNight();
  if (night === "phone") delete dataset.night;
  else dataset.night = night;
}

export function keepNight(night: Night): void {
  localStorage.setItem(KEY, night);
  showNight();
}
