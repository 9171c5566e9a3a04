/** A text entry; "" when it is missing. */
export function text(form: FormData, name: string): string {
  return String(form.get(name) ?? "");
}

/** The weekdays ticked in WeekdayTicks. */
export function weekdaysOf(form: FormData): number[] {
  return [1, 2, 3, 4, 5, 6, 7].filter((day) => form.has(`day-${day}`));
}

/** Those of these words whose tick "<prefix>-<word>" is set. */
export function ticked<const Word extends string>(
  form: FormData,
  prefix: string,
  words: readonly Word[],
): Word[] {
  return words.filter((word) => form.has(`${prefix}-${word}`));
}
