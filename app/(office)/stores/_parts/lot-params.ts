/** What stands in the address of the list of lots. */
export function readLotParams(params: Readonly<Record<string, string | undefined>>) {
  const { type = null, page = "1", all } = params;
  return { cellTypeId: type, all: all === "yes", page };
}
