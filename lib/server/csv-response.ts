/** A CSV file to keep, by a name that says what and when. */
export function csvResponse(name: string, text: string): Response {
  return new Response(text, {
    headers: {
      "content-type": "text/csv; charset=utf-8",
      "content-disposition": `attachment; filename="${name.replace(/[^a-z0-9.-]/gi, "-")}.csv"`,
      "cache-control": "no-store",
    },
  });
}
