/** A text entry; "" when it is missing. */
export function text(form: FormData, name: string): string {
  return String(form.get(name) ?? "");
}

/** Text entries under their own names. */
export function texts<const Name extends string>(
  form: FormData,
  ...names: readonly Name[]
): Record<Name, string> {
  return Object.fromEntries(names.map((name) => [name, text(form, name)])) as Record<Name, string>;
}

/** Those of these words whose tick "<prefix>-<word>" is set. */
export function ticked<const Word extends string>(
  form: FormData,
  prefix: string,
  words: readonly Word[],
): Word[] {
  return words.filter((word) => form.has(`${prefix}-${word}`));
}

/**
 * Rows of a RowList: fields named "<list>.<row>.<key>", in order. The numbers are those of the
 * form, so that a fault finds its row; rows taken off leave gaps that are closed here.
 */
export function rows<const Key extends string>(
  form: FormData,
  list: string,
  keys: readonly Key[],
): Record<Key, string>[] {
  const numbers = new Set<number>();
  for (const name of form.keys()) {
    const match = /^(\w+)\.(\d+)\.\w+$/.exec(name);
    if (match?.[1] === list) numbers.add(Number(match[2]));
  }
  return [...numbers]
    .sort((a, b) => a - b)
    .map(
      (n) =>
        Object.fromEntries(keys.map((key) => [key, text(form, `${list}.${n}.${key}`)])) as Record<
          Key,
          string
        >,
    )
    .filter((row) => Object.values(row).some((value) => value !== ""));
}
