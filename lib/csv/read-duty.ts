import { plainWord } from "./field-spec";
import { type DecimalSign, readScaled } from "./read-scaled";

export interface DutyEntry {
  readonly name: string;
  readonly currentUa: number;
  readonly durationMs: number;
}

const CURRENTS: Readonly<Record<string, number>> = { ua: 0, ma: 3, a: 6 };
const TIMES: Readonly<Record<string, number>> = { ms: 0, s: 3, min: 60_000, h: 3_600_000 };
const STATE = /^(.+?)\s+([\d.,eE+-]+)\s*(µA|μA|uA|mA|A)\s+([\d.,]+)\s*(ms|s|min|h)$/i;

/**
 * A duty cycle in one cell: "sleep 12 µA 3598 s | transmit 120 mA 0.5 s". States are parted
 * by "|" or line breaks.
 * @returns the states, or what is wrong in the words of the person
 */
export function readDuty(text: string, decimal: DecimalSign): DutyEntry[] | string {
  const entries: DutyEntry[] = [];
  for (const part of text.split(/[|\n;]/).map((p) => p.trim())) {
    if (part === "") continue;
    const entry = readState(part, decimal);
    if (!entry) return `"${part}" is no state such as: sleep 12 µA 3598 s.`;
    if (entries.some((e) => e.name === entry.name)) return `The state ${entry.name} comes twice.`;
    entries.push(entry);
  }
  return entries.length > 0 ? entries : "Give at least one state.";
}

function readState(part: string, decimal: DecimalSign): DutyEntry | null {
  const [, name, current, currentUnit = "", time, timeUnit = ""] = STATE.exec(part) ?? [];
  if (!name || !current || !time) return null;
  const currentUa = readScaled(current, decimal, CURRENTS[plainWord(currentUnit)] ?? 0);
  const durationMs = readTime(time, timeUnit.toLowerCase(), decimal);
  return currentUa !== null && currentUa >= 0 && durationMs !== null && durationMs > 0
    ? { name, currentUa, durationMs }
    : null;
}

function readTime(text: string, unit: string, decimal: DecimalSign): number | null {
  const factor = TIMES[unit] ?? 0;
  if (factor <= 3) return readScaled(text, decimal, factor);
  const thousandths = readScaled(text, decimal, 3);
  return thousandths === null ? null : Math.round((thousandths * factor) / 1000);
}

/** The same in writing, for exports. */
export function writeDuty(states: readonly DutyEntry[], decimal: "." | ","): string {
  const write = (value: number) => String(value).replace(".", decimal);
  return states
    .map(({ name, currentUa, durationMs }) => {
      const current = currentUa < 1000 ? `${currentUa} µA` : `${write(currentUa / 1000)} mA`;
      return `${name} ${current} ${write(durationMs / 1000)} s`;
    })
    .join(" | ");
}
