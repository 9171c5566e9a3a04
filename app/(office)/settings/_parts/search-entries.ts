export type SearchParams = Promise<Record<string, string | string[] | undefined>>;

/** One parameter of an address: the first of several, null when it is missing or empty. */
export function one(
  params: Readonly<Record<string, string | string[] | undefined>>,
  name: string,
): string | null {
  const value = params[name];
  return (Array.isArray(value) ? value[0] : value) || null;
}
